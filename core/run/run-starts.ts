import type { Moment } from '../evidence/moment.ts';
import type { Happening } from '../monitor/happening.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { GuaranteeRun } from './guarantee-run.ts';

/** Begins a guarantee's run anew with the events of its line, and tells each beginning. */
export class RunStarts {
  readonly #guarantee: Guarantee;
  readonly #run: GuaranteeRun;
  readonly #tell: (happening: Happening) => void;
  /** Another product than the guarantee's was set up last. */
  away = false;

  constructor({ guarantee, run }: { readonly guarantee: Guarantee; readonly run: GuaranteeRun }, tell: (happening: Happening) => void) {
    this.#guarantee = guarantee;
    this.#run = run;
    this.#tell = tell;
  }

  /** A run in which nothing was inspected is not counted once more. */
  begin(cause: 'lot' | 'changeover', detail: string, { at }: Moment): void {
    const before = this.#run.number;
    this.#run.begin(cause, detail, at);
    const { number } = this.#run;
    if (number > before) this.#tell({ kind: 'run', at, guarantee: this.#guarantee.id, run: number, cause, detail });
  }

  /** A product was set up on the line. @returns whether a run began: the guarantee's own product is back */
  productRuns(product: string, moment: Moment): boolean {
    if (this.#guarantee.product === undefined) return false;
    const back = this.away && product === this.#guarantee.product;
    this.away = product !== this.#guarantee.product;
    if (back) this.begin('changeover', product, moment);
    return back;
  }
}
