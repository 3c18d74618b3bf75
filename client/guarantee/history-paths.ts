import type { EvidenceState } from '../../core/evidence/evidence-state.ts';
import type { HistoryFrame } from './history-frame.ts';

/** A run of steps in one state as one path. */
export interface StatePath {
  readonly state: EvidenceState;
  readonly d: string;
}

const point = (frame: HistoryFrame, at: number, value: number): string => `${frame.xOf(at).toFixed(1)} ${frame.yOf(value).toFixed(1)}`;

/** A line through the values; it is broken where there is none, never drawn across. */
export function valuePath(frame: HistoryFrame, at: readonly number[], values: readonly (number | null)[]): string {
  let d = '';
  let drawing = false;
  values.forEach((value, index) => {
    const when = at[index];
    if (value === null || when === undefined) {
      drawing = false;
      return;
    }
    d += `${drawing ? 'L' : 'M'}${point(frame, when, value)}`;
    drawing = true;
  });
  return d;
}

/** The bound in pieces, one for each run of an evidence state, each joined to the next. */
export function statePaths(
  frame: HistoryFrame, at: readonly number[], values: readonly (number | null)[], states: readonly EvidenceState[],
): readonly StatePath[] {
  const paths: StatePath[] = [];
  let start = 0;
  for (let index = 1; index <= at.length; index += 1) {
    if (index < at.length && states[index] === states[start]) continue;
    const state = states[start];
    const end = Math.min(index + 1, at.length);
    const d = valuePath(frame, at.slice(start, end), values.slice(start, end));
    if (state !== undefined && d !== '') paths.push({ state, d });
    start = index;
  }
  return paths;
}
