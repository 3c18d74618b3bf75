import { latestMs } from '../units.ts';

const form = /^(\d{4})-(\d\d)-(\d\d)[Tt ](\d\d):(\d\d):(\d\d)(?:\.(\d{1,9}))?(?:[Zz]|([+-])(\d\d):(\d\d))$/;

/**
 * Milliseconds since 1970-01-01 UTC of a date and time that says its distance from UTC; parts of a
 * millisecond are cut off. Undefined for anything else: a local time without distance, a day the
 * calendar does not have, a leap second (no unit was ever counted in one), a year before 1970.
 *
 * @source RFC 3339, section 5.6
 */
export function parsedMoment(text: string): number | undefined {
  const found = form.exec(text);
  if (found === null) return undefined;
  const [year, month, day, hour, minute, second] = found.slice(1, 7).map(Number) as [number, number, number, number, number, number];
  const local = Date.UTC(year, month - 1, day, hour, minute, second, Number((found[7] ?? '').slice(0, 3).padEnd(3, '0')));
  const said = new Date(local);
  const real = said.getUTCMonth() === month - 1 && said.getUTCDate() === day && hour < 24 && minute < 60 && second < 60;
  const offsetHours = Number(found[9] ?? 0);
  const offsetMinutes = Number(found[10] ?? 0);
  if (!real || offsetHours > 23 || offsetMinutes > 59) return undefined;
  const ahead = (found[8] === '-' ? -1 : 1) * (offsetHours * 60 + offsetMinutes);
  const moment = local - ahead * 60_000;
  return moment >= 0 && moment <= latestMs ? moment : undefined;
}
