import type { Assessment } from '../evidence/assessment.ts';
import type { Batch, Bounds } from '../evidence/evidence.ts';
import { exposedRecords } from '../evidence/record-columns.ts';
import type { Margin } from '../view/guarantee-view.ts';
import { CountRun, type CountRunSnapshot } from './count-run.ts';
import type { CountChange, RunEvidence } from './run-evidence.ts';
import type { RunRule } from './run-rule.ts';

interface ExposureRunSnapshot extends CountRunSnapshot {
  readonly records: number;
}

/** The run of a guarantee on a rate: one look after every record, exposures added up one by one. */
export class ExposureRun implements RunEvidence {
  readonly #run: CountRun;
  #records = 0;

  constructor(rule: RunRule) {
    this.#run = new CountRun(rule);
  }

  get assessment(): Assessment {
    return this.#run.assessment;
  }

  get size(): number {
    return this.#run.size;
  }

  take({ part, to }: Batch, from: number): number {
    const columns = exposedRecords.columns(part, from, to);
    if (columns?.b === undefined) return to;
    for (let place = from; place < to; place += 1) {
      this.#records += 1;
      if (this.#run.add(columns.b[place - from] as number, columns.a[place - from] as number)) return place + 1;
    }
    return to;
  }

  correct(change: CountChange): void {
    this.#run.correct(change);
  }

  clear(): void {
    this.#records = 0;
    this.#run.clear();
  }

  figures(): Readonly<Record<string, number>> {
    return { runCount: this.#run.count, runExposure: this.#run.size, runRecords: this.#records };
  }

  lnDemonstrated(): number {
    return this.#run.lnDemonstrated();
  }

  lnViolated(): number {
    return this.#run.lnViolated();
  }

  bounds(): Bounds {
    return this.#run.bounds(false);
  }

  /** In records of the run's average exposure. */
  margin(): Margin {
    return this.#records === 0 ? {} : this.#run.margin(this.#run.size / this.#records);
  }

  snapshot(): ExposureRunSnapshot {
    return { ...this.#run.snapshot(), records: this.#records };
  }

  restore(from: ExposureRunSnapshot): void {
    this.#records = from.records;
    this.#run.restore(from);
  }
}
