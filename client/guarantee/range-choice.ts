import type { PlantCard } from '../../core/live/message.ts';

const minute = 60_000;

export interface Range {
  readonly name: string;
  /** Undefined: since the shift began. */
  readonly spanMs: number | undefined;
}

export const ranges: readonly Range[] = [
  { name: '15 min', spanMs: 15 * minute },
  { name: '1 h', spanMs: 60 * minute },
  { name: '8 h', spanMs: 480 * minute },
  { name: 'Shift', spanMs: undefined },
  { name: '24 h', spanMs: 1440 * minute },
  { name: '7 d', spanMs: 7 * 1440 * minute },
];

/** From when to show, ms; a shift that is not known falls back to eight hours. */
export function rangeStart(range: Range, now: number, shift: PlantCard['shift']): number {
  const span = range.spanMs ?? (shift === undefined ? 480 * minute : Math.max(minute, now - shift.since));
  return now - span;
}
