/**
 * Round values from `from` to `to`, at most `most` of them, a step of 1, 2 or 5 times a power of ten apart.
 *
 * @returns rising; empty for a span that is not above 0
 */
export function valueTicks(from: number, to: number, most: number): readonly number[] {
  const span = to - from;
  if (!(span > 0) || most < 1) return [];
  const raw = span / most;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = ([1, 2, 5, 10].find((factor) => factor * power >= raw * (1 - 1e-9)) ?? 10) * power;
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, index) => (first + index) * step);
}

const minute = 60_000;
const timeSteps = [1, 2, 5, 10, 15, 30, 60, 120, 180, 360, 720, 1440, 2880, 10_080].map((minutes) => minutes * minute);

/**
 * Round times of a plant's own clock, at most `most` of them: whole minutes, hours, days.
 *
 * @param offsetMs  how far the plant's local time is ahead of UTC, ms
 */
export function timeTicks(from: number, to: number, most: number, offsetMs: number): readonly number[] {
  const span = to - from;
  if (!(span > 0)) return [];
  const step = timeSteps.find((one) => span / one <= most) ?? Math.ceil(span / most / (7 * 1440 * minute)) * 7 * 1440 * minute;
  const first = Math.ceil((from + offsetMs) / step);
  const last = Math.floor((to + offsetMs) / step);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => (first + index) * step - offsetMs);
}

/** How far local time in a zone is ahead of UTC at a moment, ms. */
export function zoneOffset(timeZone: string, at: number): number {
  const parts = new Intl.DateTimeFormat('en-US', {
    timeZone, hourCycle: 'h23', year: 'numeric', month: 'numeric', day: 'numeric', hour: 'numeric', minute: 'numeric', second: 'numeric',
  }).formatToParts(at);
  const part = (type: Intl.DateTimeFormatPartTypes): number => Number(parts.find((one) => one.type === type)?.value ?? 0);
  const local = Date.UTC(part('year'), part('month') - 1, part('day'), part('hour'), part('minute'), part('second'));
  return local - Math.floor(at / 1000) * 1000;
}
