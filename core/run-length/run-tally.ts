/** A mean with its standard error, from the runs finished so far. */
export interface SimulatedUnits {
  /** mean units to the alarm; NaN before the first run is finished */
  readonly units: number;
  /** standard error of that mean; NaN before the second run is finished */
  readonly standardError: number;
  readonly runs: number;
  /** share of the wanted runs that are finished, 0 to 1 */
  readonly done: number;
}

/** Gathers the lengths of finished runs. */
export class RunTally {
  count = 0;
  #mean = 0;
  #squares = 0;
  readonly #wanted: number;

  constructor(wanted: number) {
    this.#wanted = wanted;
  }

  add(units: number): void {
    this.count += 1;
    const off = units - this.#mean;
    this.#mean += off / this.count;
    this.#squares += off * (units - this.#mean);
  }

  figure(): SimulatedUnits {
    const { count } = this;
    return {
      units: count > 0 ? this.#mean : NaN,
      standardError: Math.sqrt(this.#squares / (count - 1) / count),
      runs: count,
      done: count / this.#wanted,
    };
  }
}
