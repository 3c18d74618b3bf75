import type { EvidenceState } from './evidence-state.ts';

/** What the figures of a window say at one position; made by comparing whole counts, or bounds for measurements. */
export interface Assessment {
  /** Exact state, without hysteresis. */
  readonly state: EvidenceState;
  /** The bound stands on the good side by the distance the crossing rule asks for; false also where nobody asked. */
  readonly backFromCrossing: boolean;
  /** The opposite bound stands on the good side by the distance the violation rule asks for. */
  readonly backFromViolation: boolean;
}
