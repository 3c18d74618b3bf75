import type { Assessment } from './assessment.ts';
import type { Moment } from './moment.ts';

/** What takes assessments: the standing of a guarantee, or a chain that joins several stations. */
export interface Weighing {
  weigh(assessment: Assessment, position: number, moment: Moment): void;
  /** Whether an assessment must tell the return distances, too. */
  readonly waiting: boolean;
  /** Position after `position` at which to weigh again although nothing changes; Infinity where none is. */
  dueAt(position: number): number;
  beginAnew(): void;
  /** Lets everything go that is weighed together and is over by `at`, before records of that time are taken. */
  moveFirst?(at: number): void;
}
