import type { LivePicture } from './live-picture.ts';

/** How long the whole plant may send no record before its figures are no longer called live, ms of the wall clock. */
const quietAfterMs = 60_000;

export type RecordAge =
  | { readonly kind: 'none yet' }
  | { readonly kind: 'fresh' | 'old'; /** Plant time since the newest record's inspection, ms. */ readonly ageMs: number };

/** Age of the newest record of the plant. One guarantee without records is core's business; this is about all of them. */
export function recordAgeOf(picture: LivePicture, plantNow: number): RecordAge {
  let newest: number | undefined;
  for (const view of picture.views.values()) newest = view.newest === undefined ? newest : Math.max(newest ?? view.newest, view.newest);
  if (newest === undefined) return { kind: 'none yet' };
  const ageMs = Math.max(0, plantNow - newest);
  return { kind: ageMs > quietAfterMs * Math.max(1, picture.clock.rate) ? 'old' : 'fresh', ageMs };
}
