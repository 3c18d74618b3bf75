import type { Temporal } from 'temporal-polyfill';

/**
 * The moment at which a plant's wall clock first shows a local time or a later one.
 * A time that occurs twice (clocks set back) is its first occurrence; a time that is skipped (clocks set forward, or
 * a whole day left out) is the moment of the change. So a later local time is never an earlier moment, and shifts
 * that do not overlap on paper do not overlap in fact.
 *
 * @param local    date and time on the plant's wall clock
 * @param timeZone IANA time zone name, known to exist
 * @returns milliseconds since 1970-01-01 UTC
 */
export function localMomentMs(local: Temporal.PlainDateTime, timeZone: string): number {
  const earlier = local.toZonedDateTime(timeZone, { disambiguation: 'earlier' });
  if (earlier.toPlainDateTime().equals(local)) return earlier.epochMilliseconds;
  const change = earlier.getTimeZoneTransition('next');
  return (change ?? earlier).epochMilliseconds;
}
