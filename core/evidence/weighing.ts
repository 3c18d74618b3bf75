import type { Standing } from './standing.ts';

/** What takes an assessment: the standing of a guarantee, or a chain that joins several stations. */
export type Weighing = Pick<Standing, 'weigh' | 'waiting' | 'dueAt' | 'beginAnew'>;
