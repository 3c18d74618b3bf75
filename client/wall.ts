import type { Caller } from './access/me.ts';
import type { Settings } from './settings.ts';

/** A screen this large hangs on a wall unless somebody says otherwise. */
const wallQuery = matchMedia('(min-width: 2400px) and (min-height: 1200px)');
/** So does a display of at least this size that only shows. */
const displayQuery = matchMedia('(min-width: 1600px) and (min-height: 850px)');

export const wallOf = (setting: Settings['wall'], caller: Caller | undefined): boolean =>
  setting === 'on' || (setting === 'auto' && (wallQuery.matches || (caller?.kind === 'display' && !caller.terminal && displayQuery.matches)));

/** Tells when a screen's size makes it another one. */
export function onWallChange(changed: () => void): void {
  for (const query of [wallQuery, displayQuery]) query.addEventListener('change', changed);
}
