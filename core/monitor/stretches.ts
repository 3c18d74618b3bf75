import { lastWhere } from '../numerics/integer-search.ts';
import { timeAt, type TimeColumn } from '../record/time-column.ts';

/** Consecutive records of a part inspected within one minute of the plant's clock: places from (included) to `to` (excluded). */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  /** Start of the minute, ms. */
  readonly minute: number;
}

/** A part cut by minutes; records with a time that cannot be believed stand apart. */
export interface CutPart {
  readonly stretches: readonly Stretch[];
  /** Inspected later than `latest`; places from (included) to `to` (excluded). */
  readonly implausible: readonly { readonly from: number; readonly to: number }[];
}

export const minuteMs = 60_000;

const none: CutPart['implausible'] = [];

/**
 * Cuts a part of `records` records where the minute of inspection changes, in the records' order.
 *
 * @param latest last time of inspection that is believed, ms
 */
export function cutByMinute(time: TimeColumn, records: number, latest: number): CutPart {
  const first = timeAt(time, 0);
  const last = timeAt(time, records - 1);
  // A steady part, or one record, that begins and ends in one minute needs no look at its records.
  if ((time.kind === 'steady' || records === 1) && last <= latest && minuteOf(first) === minuteOf(last)) {
    return { stretches: [{ from: 0, to: records, minute: minuteOf(first) }], implausible: none };
  }
  if (time.kind === 'steady' && last <= latest) return { stretches: cutSteady(time, records), implausible: none };
  return cutOneByOne(time, records, latest);
}

/** A steady part rises: where a minute ends is found without looking at what stands between. */
function cutSteady(time: TimeColumn, records: number): Stretch[] {
  const stretches: Stretch[] = [];
  for (let from = 0; from < records; ) {
    const minute = minuteOf(timeAt(time, from));
    const last = lastWhere((place) => timeAt(time, place) < minute + minuteMs, from, records - 1, records - 1);
    stretches.push({ from, to: last + 1, minute });
    from = last + 1;
  }
  return stretches;
}

function cutOneByOne(time: TimeColumn, records: number, latest: number): CutPart {
  const stretches: Stretch[] = [];
  const implausible: { from: number; to: number }[] = [];
  let from = 0;
  let minute = keyOf(timeAt(time, 0), latest);
  for (let place = 1; place <= records; place += 1) {
    if (place < records) {
      const at = timeAt(time, place);
      if (at >= minute && at < minute + minuteMs && at <= latest) continue;
      if (minute === beyond && at > latest) continue;
    }
    if (minute === beyond) implausible.push({ from, to: place });
    else stretches.push({ from, to: place, minute });
    from = place;
    if (place < records) minute = keyOf(timeAt(time, place), latest);
  }
  return { stretches, implausible };
}

/** Stands for the minute of records that cannot be believed. */
const beyond = Infinity;

const minuteOf = (at: number): number => at - (at % minuteMs);
const keyOf = (at: number, latest: number): number => (at > latest ? beyond : minuteOf(at));

/** Stretches of one record each: where the clock follows the records, anything may fall due between two of them. */
export function* oneByOne(stretches: readonly Stretch[]): Generator<Stretch, void, undefined> {
  for (const { from, to, minute } of stretches) for (let place = from; place < to; place += 1) yield { from: place, to: place + 1, minute };
}
