/** Why a run began. */
export type RunCause = 'first' | 'restart' | 'lot' | 'changeover';
