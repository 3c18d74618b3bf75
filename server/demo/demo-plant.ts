import type { EpochMs } from '../../core/units.ts';
import { Roster } from './roster.ts';
import { minuteMs, type DemoPlant } from './station-minute.ts';

/** An invented Monday, midnight in Copenhagen. */
const firstMidnight = Date.parse('2026-01-12T00:00:00+01:00');

/** Minute of the demo plant at which people join it: 05:40, before the early shift takes over. What came before is history. */
export const joinMinute = 5 * 60 + 40;

/** @param seed whole; the same seed gives the same plant, to the last record */
export function demoPlant(seed: number): DemoPlant {
  return { midnight: firstMidnight, seed, roster: new Roster(seed) };
}

/** The minute of the demo plant in which a moment of its clock lies. */
export const minuteAt = ({ midnight }: DemoPlant, at: number): number => Math.floor((at - midnight) / minuteMs);

/** When a minute of the demo plant begins. */
export const momentOf = ({ midnight }: DemoPlant, minute: number): EpochMs => (midnight + minute * minuteMs) as EpochMs;
