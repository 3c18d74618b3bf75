import type { AlarmDesk } from '../alarm/alarm-desk.ts';
import type { AlarmGrounds } from '../alarm/alarm.ts';
import type { Batch } from '../evidence/evidence.ts';
import type { Moment, RecordMoment } from '../evidence/moment.ts';
import { nonconformingPlaces, type Limit } from '../evidence/nonconforming-places.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import { admitFound, admitQuiet, clearAlarm, newDetector, type DetectorState } from '../sequential/change-detector.ts';
import { conformingToHalfWay, detectorGauge, nonconformingToAlarm } from '../sequential/detector-reading.ts';
import type { DetectorTuning } from '../sequential/detector-tuning.ts';
import type { DetectorView } from './detector-view.ts';
import { EventSieve } from './event-sieve.ts';

export type DeteriorationRule = Extract<AlarmRule, { kind: 'deterioration' }>;

/** How a change watch is set: made from the guarantee by `changeWatchOf`. */
export interface ChangeSetting {
  readonly guarantee: Guarantee;
  readonly rule: DeteriorationRule;
  readonly tuning: DetectorTuning;
  /** Rate of the well line, per unit or per unit of exposure. */
  readonly baseline: number;
  /** Judges measurements, where values beyond a limit are counted. */
  readonly limit: Limit | undefined;
}

export interface ChangeWatchSnapshot {
  readonly state: DetectorState;
  /** Units (or exposure) seen at which the alarm may return, if the gauge is low by then; -1 while none stands. */
  readonly calmFrom: number;
  /** Units since the newest nonconforming one, where events are counted. */
  readonly sinceFound?: number | undefined;
}

/** Units without a nonconforming one that would speak for the baseline at 95 %, times the baseline. */
const calmUnits = 3;

/**
 * Watches a guarantee for a rate that has risen (rules J1 to J3). It raises its alarm at the nonconforming unit that
 * takes the detector to its threshold and begins anew there; the alarm returns when three times the usual distance
 * between nonconforming units has passed since and the gauge stands at half way or below.
 */
export class ChangeWatch {
  readonly #setting: ChangeSetting;
  readonly #desk: AlarmDesk;
  readonly #grounds: (moment: Moment, figures: Readonly<Record<string, number>>) => AlarmGrounds;
  readonly #sieve: EventSieve;
  #state: DetectorState;
  #calmFrom = -1;

  constructor(setting: ChangeSetting, desk: AlarmDesk, grounds: (moment: Moment, figures: Readonly<Record<string, number>>) => AlarmGrounds) {
    this.#setting = setting;
    this.#desk = desk;
    this.#grounds = grounds;
    this.#state = newDetector(setting.tuning);
    const { clusters } = setting.guarantee;
    this.#sieve = new EventSieve(clusters?.kind === 'events' ? clusters.gap : 0);
  }

  /** Takes records in order. A record that comes late counts nowhere: a detector looks at what happens now. */
  take({ part, from, to }: Batch, moment: RecordMoment): void {
    if (part.kind === 'verdicts' || part.kind === 'measurements') {
      const places = nonconformingPlaces(part, from, to, this.#setting.limit);
      let done = from;
      const events = this.#sieve.over(places, from, to);
      for (let k = 0; k < events.length; k += 1) {
        const place = events[k] as number;
        this.#quiet(place - done, moment, done);
        moment.place = place;
        this.#found(1, 1, moment);
        done = place + 1;
      }
      this.#quiet(to - done, moment, done);
      moment.place = to - 1;
      return;
    }
    for (let place = from; place < to; place += 1) {
      moment.place = place;
      if (part.kind === 'exposures') this.#record(part.count[place] as number, part.exposure[place] as number, moment);
      else this.#tally(part.inspected[place] as number, part.nonconforming[place] as number, moment);
    }
  }

  /** Evidence was restarted at a declared event: the detector begins anew, a standing alarm waits for calm from here. */
  beginAnew(): void {
    const { seen, alarms, alarmAt } = this.#state;
    this.#state = { ...newDetector(this.#setting.tuning), seen, alarms, alarmAt };
    if (this.#calmFrom >= 0) this.#calmFrom = seen + this.#calm;
    this.#sieve.beginAnew();
  }

  view(): DetectorView {
    const { tuning, baseline, rule } = this.#setting;
    const finite = (value: number): number | undefined => (Number.isFinite(value) ? value : undefined);
    return {
      gauge: detectorGauge(this.#state, tuning),
      inARowToAlarm: finite(nonconformingToAlarm(this.#state, tuning)),
      conformingToHalfWay: finite(conformingToHalfWay(this.#state, tuning)),
      betweenFalseCalls: rule.unitsBetweenFalseCalls,
      baseline,
    };
  }

  snapshot(): ChangeWatchSnapshot {
    return { state: this.#state, calmFrom: this.#calmFrom, sinceFound: this.#sieve.since };
  }

  restore(from: ChangeWatchSnapshot): void {
    this.#state = from.state;
    this.#calmFrom = from.calmFrom;
    this.#sieve.restore(from.sinceFound ?? Infinity);
  }

  get #calm(): number {
    return calmUnits / this.#setting.baseline;
  }

  #tally(inspected: number, nonconforming: number, moment: Moment): void {
    const events = this.#sieve.overTally(inspected, nonconforming);
    this.#state = admitQuiet(this.#state, inspected - events, this.#setting.tuning);
    for (let unit = 0; unit < events; unit += 1) this.#found(1, 1, moment);
    if (events === 0) this.#settle(moment);
  }

  #record(count: number, exposure: number, moment: Moment): void {
    if (count > 0) this.#found(count, exposure, moment);
    else {
      this.#state = admitQuiet(this.#state, 1, this.#setting.tuning, exposure);
      this.#settle(moment);
    }
  }

  /** Conforming units, the first of them at place `from`; an alarm that returns among them returns at its unit. */
  #quiet(units: number, moment: RecordMoment, from: number): void {
    if (units === 0) return;
    const { tuning } = this.#setting;
    const wait = this.#calmFrom < 0 ? Infinity : Math.max(1, Math.ceil(this.#calmFrom - this.#state.seen), conformingToHalfWay(this.#state, tuning));
    if (wait <= units) {
      moment.place = from + wait - 1;
      this.#endAlarm(moment);
    }
    this.#state = admitQuiet(this.#state, units, tuning);
  }

  #found(found: number, weight: number, moment: Moment): void {
    const { tuning, guarantee, rule, baseline } = this.#setting;
    const { alarms } = this.#state;
    this.#state = admitFound(this.#state, found, tuning, weight);
    if (this.#state.alarms === alarms) {
      this.#settle(moment);
      return;
    }
    const { seen } = this.#state;
    this.#calmFrom = seen + this.#calm;
    this.#desk.raise(guarantee, rule, moment.at, () => this.#grounds(moment, { seen, baseline, betweenFalseCalls: rule.unitsBetweenFalseCalls }));
  }

  #settle(moment: Moment): void {
    if (this.#calmFrom < 0 || this.#state.seen < this.#calmFrom) return;
    if (detectorGauge(this.#state, this.#setting.tuning) <= 0.5) this.#endAlarm(moment);
  }

  #endAlarm(moment: Moment): void {
    this.#calmFrom = -1;
    this.#state = clearAlarm(this.#state);
    this.#desk.returned(this.#setting.guarantee.id, 'deterioration', moment.at);
  }
}
