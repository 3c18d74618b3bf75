/** Where the bound's tip stood over the last hour, a mark every five minutes of the plant clock. */
const marks = 12;
const stepMs = 5 * 60_000;

export interface TipTrailSnapshot {
  readonly tips: readonly number[];
  readonly due: number;
  readonly quiet: number;
}

/** Marks of allowance used, oldest first. */
export class TipTrail {
  #tips: number[] = [];
  #due = Infinity;
  /** Marks made since the last record: after an hour of them there is nothing new to mark. */
  #quiet = 0;

  /** Moment at which the next mark is to be made, ms; Infinity while nothing moves. */
  get due(): number {
    return this.#due;
  }

  get tips(): readonly number[] {
    return this.#tips;
  }

  /** A record came, at plant clock `at`. */
  wake(at: number): void {
    this.#quiet = 0;
    if (this.#due === Infinity) this.#due = nextMark(at);
  }

  /** Keeps where the tip stands at `at`; nothing where there is no bound. */
  mark(at: number, tip: number | undefined): void {
    this.#quiet += 1;
    this.#due = this.#quiet > marks ? Infinity : nextMark(at);
    if (tip === undefined || !Number.isFinite(tip)) return;
    this.#tips.push(tip);
    if (this.#tips.length > marks) this.#tips.shift();
  }

  /** Which way the tip has gone from the oldest mark to `tip`; a twentieth of the allowance is a move. */
  drift(tip: number | undefined): 'rising' | 'falling' | 'steady' | undefined {
    const oldest = this.#tips[0];
    if (oldest === undefined || tip === undefined) return undefined;
    if (Math.abs(tip - oldest) < 0.05) return 'steady';
    return tip > oldest ? 'rising' : 'falling';
  }

  snapshot(): TipTrailSnapshot {
    return { tips: [...this.#tips], due: this.#due, quiet: this.#quiet };
  }

  restore(from: TipTrailSnapshot): void {
    this.#tips = [...from.tips];
    this.#due = from.due;
    this.#quiet = from.quiet;
  }
}

const nextMark = (at: number): number => at - (at % stepMs) + stepMs;
