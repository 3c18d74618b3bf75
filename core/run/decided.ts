import type { Assessment } from '../evidence/assessment.ts';
import type { Guarantee } from '../plant/guarantee.ts';

/**
 * What decides the state of a guarantee: its window at one look, its run at all looks, or the window with the run
 * deciding the violation.
 */
export function decided(looks: Guarantee['looks'], window: Assessment, run: Assessment | undefined): Assessment {
  if (run === undefined || looks === 'one look') return window;
  if (window.state === 'unknown' || run.state === 'unknown') return { state: 'unknown', backFromCrossing: false, backFromViolation: false };
  if (looks === 'all looks') return run;
  const state = run.state === 'violated' ? 'violated' : window.state === 'violated' ? 'undecided' : window.state;
  return { state, backFromCrossing: window.backFromCrossing && state === 'demonstrated', backFromViolation: run.backFromViolation };
}
