import type { Complain } from './complain.ts';
import type { Shift } from './plant.ts';

const weekMinutes = 7 * 1440;

/**
 * Complains of each shift that overlaps an earlier one of the list on some day of the week, and of names that stand
 * twice. Compared on paper: clock changes cannot make an overlap of shifts that have none (see localMomentMs).
 */
export function checkShifts(shifts: readonly Shift[], complain: Complain): void {
  for (const [at, shift] of shifts.entries()) {
    const earlier = shifts.slice(0, at);
    if (earlier.some(({ name }) => name === shift.name)) complain(['shifts', at, 'name'], 'a name that no other shift has');
    const overlapped = earlier.find((other) => overlaps(other, shift));
    if (overlapped !== undefined) complain(['shifts', at, 'from'], `a shift that does not overlap '${overlapped.name}'`);
    if (new Set(shift.days).size < shift.days.length) complain(['shifts', at, 'days'], 'each weekday once');
  }
}

function overlaps(one: Shift, other: Shift): boolean {
  return spansOf(one).some(([from, length]) =>
    spansOf(other).some(([otherFrom, otherLength]) => {
      const ahead = (otherFrom - from + weekMinutes) % weekMinutes;
      return ahead < length || weekMinutes - ahead < otherLength;
    }),
  );
}

function spansOf({ days, fromMinute, toMinute }: Shift): readonly (readonly [from: number, length: number])[] {
  const length = toMinute > fromMinute ? toMinute - fromMinute : toMinute - fromMinute + 1440;
  return days.map((day) => [(day - 1) * 1440 + fromMinute, length]);
}
