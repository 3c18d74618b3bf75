import { Temporal } from 'temporal-polyfill';

export const timeZoneForms = 'an IANA time zone name, e.g. Europe/Copenhagen or UTC';

/** The zone's name if the platform knows it by name; an offset such as +01:00 is none, it knows no clock changes. */
export function timeZoneOf(text: string): string | undefined {
  if (!/^[A-Za-z][A-Za-z0-9_+/-]*$/.test(text)) return undefined;
  try {
    return Temporal.Instant.fromEpochMilliseconds(0).toZonedDateTimeISO(text).timeZoneId;
  } catch (cause) {
    if (cause instanceof RangeError) return undefined;
    throw cause;
  }
}
