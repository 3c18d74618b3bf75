/** Weekdays as the plant file writes them, from ISO weekday 1 to 7. */
export const weekdays = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'] as const;

export const weekdaysForms = 'weekdays, e.g. Mon-Fri, Sat or [Mon, Wed]';
export const minuteForms = 'a time of day in quotes from "00:00" to "23:59"';

/**
 * Reads 'Mon-Fri' or 'Sat'; a span may run over the end of the week ('Fri-Mon').
 *
 * @returns ISO weekdays, 1 = Monday to 7 = Sunday, in the order of the span; undefined if it is none
 */
export function weekdaysOf(text: string): readonly number[] | undefined {
  const [first = '', last = first, ...rest] = text.split('-').map((day) => day.trim());
  const from = weekdayOf(first);
  const to = weekdayOf(last);
  if (from === undefined || to === undefined || rest.length > 0) return undefined;
  return Array.from({ length: ((to - from + 7) % 7) + 1 }, (_, at) => ((from - 1 + at) % 7) + 1);
}

export function weekdayOf(text: string): number | undefined {
  const at = weekdays.findIndex((day) => day === text);
  return at < 0 ? undefined : at + 1;
}

/** Reads 'HH:MM' into minutes after midnight, 0 to 1439. */
export function minuteOf(text: string): number | undefined {
  const parts = /^([01]\d|2[0-3]):([0-5]\d)$/.exec(text);
  return parts === null ? undefined : Number(parts[1]) * 60 + Number(parts[2]);
}
