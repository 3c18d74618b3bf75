import type { Settings } from './settings.ts';

/** A screen this large hangs on a wall unless somebody says otherwise. */
export const wallQuery: MediaQueryList = matchMedia('(min-width: 2400px) and (min-height: 1200px)');

export const wallOf = (setting: Settings['wall']): boolean => setting === 'on' || (setting === 'auto' && wallQuery.matches);
