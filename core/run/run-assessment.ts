import type { Assessment } from '../evidence/assessment.ts';
import type { EvidenceState } from '../evidence/evidence-state.ts';

const states: readonly EvidenceState[] = ['gathering', 'demonstrated', 'undecided', 'violated', 'unknown'];
const flags = [false, true] as const;
const all: readonly Assessment[] = states.flatMap((state) =>
  flags.flatMap((backFromCrossing) => flags.map((backFromViolation) => ({ state, backFromCrossing, backFromViolation }))));

/** The one object that says this, so that `===` tells whether anything changed. */
export function runAssessment(state: EvidenceState, backFromCrossing: boolean, backFromViolation: boolean): Assessment {
  const place = 4 * states.indexOf(state) + (backFromCrossing ? 2 : 0) + (backFromViolation ? 1 : 0);
  return all[place] as Assessment;
}
