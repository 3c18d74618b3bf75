import type { EpochMs } from '../../core/units.ts';

/**
 * How the plant clock is told. 'wall': as the machine's. 'fast': `rate` times as fast, from `start` on (the demo).
 * 'records': it stands at the newest record taken, for rehearsing with stored records.
 */
export type ClockSetting =
  | { readonly kind: 'wall' }
  | { readonly kind: 'fast'; readonly rate: number; readonly start: EpochMs }
  | { readonly kind: 'records' };

/** The plant clock of a running server, the only place where it is asked what time it is. It never goes back. */
export interface PlantClock {
  /** Plant seconds a wall second. */
  readonly rate: number;
  now(): EpochMs;
}

/**
 * @param wallNow milliseconds since 1970-01-01 UTC, as the machine has it
 * @returns undefined where the clock follows the records
 */
export function plantClock(setting: ClockSetting, wallNow: () => number = Date.now): PlantClock | undefined {
  if (setting.kind === 'records') return undefined;
  const began = wallNow();
  const rate = setting.kind === 'fast' ? setting.rate : 1;
  const start = setting.kind === 'fast' ? setting.start : began;
  let newest = 0;
  return {
    rate,
    now() {
      newest = Math.max(newest, start + Math.floor((wallNow() - began) * rate));
      return newest as EpochMs;
    },
  };
}
