/** Chance that can be repeated, for the demo: the same words give the same numbers, on every machine. */
export class Chance {
  #a: number;
  #b: number;
  #c: number;
  #d: number;

  /** @param words what the numbers are for, e.g. a station and a minute: those of different words are unrelated */
  constructor(...words: readonly (string | number)[]) {
    const text = words.join('/');
    this.#a = scrambled(text, 1);
    this.#b = scrambled(text, 2);
    this.#c = scrambled(text, 3);
    this.#d = scrambled(text, 4) | 1; // Four zeros would stay zeros.
  }

  /** A number from 0 (excluded) to 1 (excluded), evenly. */
  share(): number {
    return (this.#next() + 0.5) / 4_294_967_296;
  }

  /** A whole number from 0 to `count` - 1, evenly. */
  below(count: number): number {
    return Math.floor(this.share() * count);
  }

  /** One of the given, each as likely. */
  oneOf<T>(choices: readonly [T, ...T[]]): T {
    return choices[this.below(choices.length)] ?? choices[0];
  }

  /** A value of a normal law. @source G. E. P. Box, M. E. Muller 1958 (from memory) */
  normal(mean: number, sd: number): number {
    return mean + sd * Math.sqrt(-2 * Math.log(this.share())) * Math.cos(2 * Math.PI * this.share());
  }

  /** A count of a Poisson law: how many exponential waits fit into `mean`. Meant for means up to some dozens. */
  poisson(mean: number): number {
    let count = -1;
    for (let waited = 0; waited < mean; count += 1) waited -= Math.log(this.share());
    return Math.max(count, 0);
  }

  /** Which of `units` units are hit, each with chance `p`: places from 0, rising. The gaps follow a geometric law. */
  places(units: number, p: number): number[] {
    const found: number[] = [];
    if (!(p > 0)) return found;
    const miss = Math.log1p(-Math.min(p, 1));
    for (let place = -1; ;) {
      place += 1 + Math.floor(Math.log(this.share()) / miss);
      if (!(place < units)) return found;
      found.push(place);
    }
  }

  /** @source G. Marsaglia, Xorshift RNGs, J. Stat. Software 8 (2003) 14, the generator of 128 bits (from memory) */
  #next(): number {
    const mixed = this.#a ^ (this.#a << 11);
    this.#a = this.#b;
    this.#b = this.#c;
    this.#c = this.#d;
    this.#d = (this.#d ^ (this.#d >>> 19) ^ mixed ^ (mixed >>> 8)) | 0;
    return this.#d >>> 0;
  }
}

/** 32 bits of a text. @source the mixing of Fowler, Noll and Vo (1a), then a xor-shift-multiply finish (from memory) */
function scrambled(text: string, round: number): number {
  let bits = 0x811c9dc5 ^ Math.imul(round, 0x9e3779b1);
  for (let i = 0; i < text.length; i += 1) bits = Math.imul(bits ^ text.charCodeAt(i), 0x01000193);
  bits = Math.imul(bits ^ (bits >>> 16), 0x85ebca6b);
  bits = Math.imul(bits ^ (bits >>> 13), 0xc2b2ae35);
  return (bits ^ (bits >>> 16)) | 0;
}
