/**
 * The whole counts at which a one-sided bound stands exactly on a line: what the record path compares instead of
 * computing bounds. 'Size' is the evidence the counts were found in: units inspected, or exposure.
 */
export interface Thresholds {
  /** Smallest size at which `count` nonconforming units still leave the bound on the safe side; Infinity if none. */
  sizeToDemonstrate(count: number): number;
  /** Largest size at which `count` nonconforming units put the opposite bound beyond the line; 0 if none. */
  sizeViolated(count: number): number;
}

/** Counts below which thresholds are remembered: 8 MiB a table at most, however many a record claims to have counted. */
const mostRemembered = 1_048_576;

/** Remembers thresholds as they are first asked for; a table of 8 bytes a count, grown by doubling. */
export class RememberedThresholds implements Thresholds {
  readonly #of: Thresholds;
  #demonstrate = new Float64Array(64).fill(NaN);
  #violated = new Float64Array(64).fill(NaN);

  constructor(of: Thresholds) {
    this.#of = of;
  }

  sizeToDemonstrate(count: number): number {
    if (count >= mostRemembered) return this.#of.sizeToDemonstrate(count);
    if (count >= this.#demonstrate.length) this.#demonstrate = grown(this.#demonstrate, count);
    const known = this.#demonstrate[count] as number;
    return known === known ? known : (this.#demonstrate[count] = this.#of.sizeToDemonstrate(count));
  }

  sizeViolated(count: number): number {
    if (count >= mostRemembered) return this.#of.sizeViolated(count);
    if (count >= this.#violated.length) this.#violated = grown(this.#violated, count);
    const known = this.#violated[count] as number;
    return known === known ? known : (this.#violated[count] = this.#of.sizeViolated(count));
  }
}

function grown(table: Float64Array, count: number): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(Math.max(count + 1, table.length * 2)).fill(NaN);
  larger.set(table);
  return larger;
}
