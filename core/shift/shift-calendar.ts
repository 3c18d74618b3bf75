import { Temporal } from 'temporal-polyfill';
import type { Shift } from '../plant/plant.ts';
import type { EpochMs } from '../units.ts';
import { localMomentMs } from './local-moment.ts';
import type { ShiftInstance } from './shift-instance.ts';

/** A stretch of time with the shift that fills it, or with none. */
interface Stretch {
  readonly since: number;
  readonly until: number;
  readonly shift: ShiftInstance | undefined;
}

const nowhere: Stretch = { since: 0, until: 0, shift: undefined };

/**
 * Tells which shift a moment belongs to, correct across clock changes: a night shift from 22:00 to 06:00 lasts 7 or
 * 9 hours when the clocks are moved by one. Local times that occur twice or not at all: see localMomentMs. A shift
 * whose whole span is skipped by the clocks does not take place.
 *
 * Asked in order of time it answers from the stretch it is in; it works out five days at once, and anew only when a
 * moment lies outside them. Holds these days and nothing more.
 */
export class ShiftCalendar {
  readonly #shifts: readonly Shift[];
  readonly #timeZone: string;
  #now: Stretch = nowhere;
  #near: readonly Stretch[] = [];

  /**
   * @param shifts   of one plant, not overlapping on paper
   * @param timeZone IANA time zone name, known to exist
   */
  constructor(shifts: readonly Shift[], timeZone: string) {
    this.#shifts = shifts;
    this.#timeZone = timeZone;
  }

  /**
   * The shift at a moment; undefined between shifts. The same shift is told apart by its `since`, not by object.
   *
   * @param at any moment, also before an earlier asked one
   */
  instanceAt(at: EpochMs): ShiftInstance | undefined {
    if (at < this.#now.since || at >= this.#now.until) this.#now = this.#found(at) ?? this.#workedOut(at);
    return this.#now.shift;
  }

  #found(at: number): Stretch | undefined {
    return this.#near.find((stretch) => at >= stretch.since && at < stretch.until);
  }

  #workedOut(at: number): Stretch {
    this.#near = stretchesAround(at, this.#shifts, this.#timeZone);
    return this.#found(at) ?? nowhere;
  }
}

/** The local day of a moment with two days either side, as stretches that follow each other without a hole. */
function stretchesAround(at: number, shifts: readonly Shift[], timeZone: string): readonly Stretch[] {
  const today = Temporal.Instant.fromEpochMilliseconds(at).toZonedDateTimeISO(timeZone).toPlainDate();
  const days = [-3, -2, -1, 0, 1, 2].map((offset) => today.add({ days: offset }));
  const end = localMomentMs(today.add({ days: 3 }).toPlainDateTime(), timeZone);
  const instances = days.flatMap((day) => instancesBegunOn(day, shifts, timeZone));
  const stretches: Stretch[] = [];
  let reached = localMomentMs(today.subtract({ days: 2 }).toPlainDateTime(), timeZone);
  for (const shift of instances.sort((a, b) => a.since - b.since)) {
    if (shift.until <= reached) continue;
    if (shift.since > reached) stretches.push({ since: reached, until: shift.since, shift: undefined });
    stretches.push({ since: shift.since, until: shift.until, shift });
    reached = shift.until;
  }
  if (reached < end) stretches.push({ since: reached, until: end, shift: undefined });
  return stretches;
}

function instancesBegunOn(day: Temporal.PlainDate, shifts: readonly Shift[], timeZone: string): ShiftInstance[] {
  return shifts
    .filter((shift) => shift.days.includes(day.dayOfWeek))
    .map(({ name, fromMinute, toMinute }) => ({
      name,
      since: momentOf(day, fromMinute, timeZone),
      until: momentOf(toMinute > fromMinute ? day : day.add({ days: 1 }), toMinute, timeZone),
    }));
}

function momentOf(day: Temporal.PlainDate, minute: number, timeZone: string): EpochMs {
  const local = day.toPlainDateTime({ hour: Math.floor(minute / 60), minute: minute % 60 });
  return localMomentMs(local, timeZone) as EpochMs;
}
