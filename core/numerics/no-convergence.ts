/** A solver that ran out of steps. It has no answer: whoever catches this shows the state as unknown. */
export class NoConvergence extends Error {
  readonly what: string;

  constructor(what: string) {
    super(`no convergence: ${what}`);
    this.name = 'NoConvergence';
    this.what = what;
  }
}
