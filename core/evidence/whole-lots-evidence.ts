import type { Finding } from '../record/part.ts';
import type { Margin } from '../view/guarantee-view.ts';
import { joinedRanges, type RecordIdentity, type RecordRange } from '../window/record-identity.ts';
import { countBounds } from './count-bounds.ts';
import type { CountRule } from './count-rule.ts';
import type { Batch, Bounds, CorrectionFate, Evidence } from './evidence.ts';
import type { Moment, RecordMoment } from './moment.ts';
import type { Standing } from './standing.ts';
import { stationRule } from './station-link.ts';
import { UnitEvidence, type UnitEvidenceSnapshot } from './unit-evidence.ts';
import type { Weighing } from './weighing.ts';

export interface WholeLotsSettings {
  /** Lots of the window; undefined for a growing one. */
  readonly size: number | undefined;
  /** Nonconforming units that a lot may hold and still conform. */
  readonly allowed: number;
  readonly asYield: boolean;
}

export interface WholeLotsSnapshot {
  readonly position: number;
  readonly lots: readonly { readonly id: string; readonly ended: boolean; readonly units: UnitEvidenceSnapshot }[];
}

interface Lot {
  readonly id: string;
  readonly units: UnitEvidence;
  /** Counted from now on; late records and corrections still change it. */
  ended: boolean;
}

/** A lot is weighed when it has ended, and not by itself. */
const unweighed: Weighing = { waiting: false, weigh: () => undefined, dueAt: () => Infinity, beginAnew: () => undefined };

/**
 * Evidence on a fraction of lots: how many of those that ended held more nonconforming units than allowed. A lot ends with
 * its end mark, or when another begins.
 */
export class WholeLotsEvidence implements Evidence {
  readonly #settings: WholeLotsSettings;
  readonly #rule: CountRule;
  readonly #standing: Standing;
  /** Oldest first; at most one of them has not ended, the last. */
  #lots: Lot[] = [];
  #position = 0;

  constructor(settings: WholeLotsSettings, rule: CountRule, standing: Standing) {
    this.#settings = settings;
    this.#rule = rule;
    this.#standing = standing;
  }

  /** Lots that have ended since the watch began. */
  get position(): number {
    return this.#position;
  }

  take(batch: Batch, moment: RecordMoment): void {
    const { lot: id } = batch;
    if (id === undefined) {
      this.#standing.block('lot', 'The lot of the records has not been told.');
      moment.place = batch.to - 1;
      this.weigh(moment);
      return;
    }
    const wasBlocked = this.#standing.isBlockedBy('lot');
    this.#standing.lift('lot');
    moment.place = batch.from;
    const lot = this.#lots.find((one) => one.id === id) ?? this.#begin(id, moment);
    const before = this.#isOver(lot);
    lot.units.take(batch, moment);
    if (wasBlocked || (lot.ended && this.#isOver(lot) !== before)) this.weigh(moment);
  }

  fill(batch: Batch, moment: RecordMoment): void {
    this.#lots.find(({ id }) => id === batch.lot)?.units.fill(batch, moment);
    moment.place = batch.to - 1;
    this.weigh(moment);
  }

  correct(identity: RecordIdentity, station: number, finding: Finding, moment: Moment): CorrectionFate {
    for (const { units } of [...this.#lots].reverse()) {
      const fate = units.correct(identity, station, finding, moment);
      if (fate === 'not here') continue;
      if (fate === 'corrected') this.weigh(moment);
      return fate;
    }
    return 'not here';
  }

  endLot(id: string, moment: Moment): void {
    const lot = this.#lots.find((one) => one.id === id);
    if (lot === undefined || lot.ended) return;
    this.#end(lot);
    this.weigh(moment);
  }

  clear(moment: Moment): void {
    this.#lots = [];
    this.#standing.beginAnew();
    this.weigh(moment);
  }

  moveClock(): void {
    // Lots leave this window by number, not by age.
  }

  nextDue(): number {
    return Infinity;
  }

  weigh(moment: Moment): void {
    const { lots, over } = this.#counts();
    const ripe = this.#settings.size === undefined || lots === this.#settings.size;
    this.#standing.weigh(this.#rule.judge.assess(lots, over, ripe, this.#standing.waiting), this.#position, moment);
  }

  figures(): Readonly<Record<string, number>> {
    const { lots, over } = this.#counts();
    const filled = lots / this.#rule.thresholds.sizeToDemonstrate(0);
    const { size } = this.#settings;
    const now = this.#lots.at(-1);
    return {
      lots, lotsOver: over,
      ...(size === undefined ? {} : { windowLots: size }),
      ...(filled < 1 ? { filled } : {}),
      ...(now === undefined || now.ended ? {} : { inspectedOfLot: now.units.window.inspected, nonconformingOfLot: now.units.window.nonconforming }),
    };
  }

  ranges(): readonly RecordRange[] {
    return joinedRanges(this.#lots.flatMap(({ units }) => units.ranges()));
  }

  bounds(): Bounds {
    const { lots, over } = this.#counts();
    return countBounds(this.#rule, lots, over, this.#settings.asYield);
  }

  /** In units nothing can be told of lots. */
  margin(): Margin {
    return {};
  }

  warnings(): readonly string[] {
    return [];
  }

  snapshot(): WholeLotsSnapshot {
    return { position: this.#position, lots: this.#lots.map(({ id, ended, units }) => ({ id, ended, units: units.snapshot() })) };
  }

  restore(from: WholeLotsSnapshot): void {
    this.#position = from.position;
    this.#lots = from.lots.map(({ id, ended, units }) => {
      const lot: Lot = { id, ended, units: this.#unitsOfLot() };
      lot.units.restore(units);
      return lot;
    });
  }

  /** Ends the lot before, if it has not ended, and begins another. */
  #begin(id: string, moment: Moment): Lot {
    const before = this.#lots.at(-1);
    const lot: Lot = { id, ended: false, units: this.#unitsOfLot() };
    this.#lots.push(lot);
    if (before !== undefined && !before.ended) {
      this.#end(before);
      this.weigh(moment);
    }
    return lot;
  }

  #end(lot: Lot): void {
    lot.ended = true;
    this.#position += 1;
    const { size = Infinity } = this.#settings;
    const ended = this.#lots.filter((one) => one.ended);
    if (ended.length > size) this.#lots = this.#lots.filter((one) => one !== ended[0]);
  }

  #isOver({ units }: Lot): boolean {
    return units.window.nonconforming > this.#settings.allowed;
  }

  #counts(): { readonly lots: number; readonly over: number } {
    const ended = this.#lots.filter((one) => one.ended);
    return { lots: ended.length, over: ended.filter((lot) => this.#isOver(lot)).length };
  }

  #unitsOfLot(): UnitEvidence {
    return new UnitEvidence({ size: undefined, gap: undefined, limit: undefined, asYield: false }, stationRule, unweighed);
  }
}
