import type { Assessment } from '../evidence/assessment.ts';
import type { Batch, Bounds } from '../evidence/evidence.ts';
import type { Limit } from '../evidence/nonconforming-places.ts';
import { firstAtOrAfter, tellsUnits } from '../evidence/nonconforming-places.ts';
import type { Margin } from '../view/guarantee-view.ts';
import { CountRun, type CountRunSnapshot } from './count-run.ts';
import type { CountChange, RunEvidence } from './run-evidence.ts';
import type { RunRule } from './run-rule.ts';

interface UnitRunSnapshot extends CountRunSnapshot {
  readonly lotSize: number | undefined;
}

export interface UnitRunSettings {
  /** Judges measurements, where the quantity counts values beyond a limit. */
  readonly limit: Limit | undefined;
  readonly asYield: boolean;
  /** Makes the rule of a lot of this size; undefined where the quantity is not about a lot. */
  readonly ruleOfLot?: (size: number) => RunRule;
}

/** The run of a guarantee on units: verdicts, tallies, measurements judged by a limit, or the sample of a lot. */
export class UnitRun implements RunEvidence {
  readonly #settings: UnitRunSettings;
  readonly #run: CountRun;
  #lotSize: number | undefined;

  constructor(rule: RunRule, settings: UnitRunSettings) {
    this.#run = new CountRun(rule);
    this.#settings = settings;
    this.setLotSize(undefined);
  }

  get assessment(): Assessment {
    return this.#run.assessment;
  }

  get size(): number {
    return this.#run.size;
  }

  take({ part, places, to }: Batch, from: number): number {
    if (!tellsUnits(part, this.#settings.limit)) return to;
    if (part.kind === 'tallies') {
      for (let place = from; place < to; place += 1) {
        if (this.#run.add(part.inspected[place] as number, part.nonconforming[place] as number)) return place + 1;
      }
      return to;
    }
    let row = firstAtOrAfter(places, from);
    for (let place = from; place < to; row += 1) {
      const found = Math.min(to, places[row] ?? to);
      if (found > place) {
        const before = this.#run.assessment;
        place += this.#run.addConforming(found - place);
        if (this.#run.assessment !== before) return place;
      }
      if (found === to) return to;
      place = found + 1;
      if (this.#run.add(1, 1)) return place;
    }
    return to;
  }

  correct(change: CountChange): void {
    this.#run.correct(change);
  }

  clear(): void {
    this.#run.clear();
  }

  setLotSize(size: number | undefined): void {
    const { ruleOfLot } = this.#settings;
    if (!ruleOfLot) return;
    this.#lotSize = size;
    this.#run.useRule(size === undefined ? { ...ruleOfLot(1), most: -1 } : ruleOfLot(size));
  }

  figures(): Readonly<Record<string, number>> {
    return { runUnits: this.#run.size, runNonconforming: this.#run.count, ...(this.#lotSize === undefined ? {} : { lotSize: this.#lotSize }) };
  }

  lnDemonstrated(): number {
    return this.#run.lnDemonstrated();
  }

  lnViolated(): number {
    return this.#run.lnViolated();
  }

  bounds(): Bounds {
    return this.#run.bounds(this.#settings.asYield);
  }

  margin(): Margin {
    return this.#run.margin(1);
  }

  snapshot(): UnitRunSnapshot {
    return { ...this.#run.snapshot(), lotSize: this.#lotSize };
  }

  restore(from: UnitRunSnapshot): void {
    this.setLotSize(from.lotSize);
    this.#run.restore(from);
  }
}
