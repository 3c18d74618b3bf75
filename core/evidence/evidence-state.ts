/**
 * Where the evidence of a guarantee stands. 'unknown' is neither well nor ill: the sum failed, or data are
 * missing or contradictory.
 */
export type EvidenceState = 'gathering' | 'demonstrated' | 'undecided' | 'violated' | 'unknown';

/** Whether a bound holds at one look fixed in advance or at all looks of a running line. */
export type LookRule = 'one look' | 'all looks';
