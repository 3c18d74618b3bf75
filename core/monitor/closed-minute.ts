import type { EvidenceState } from '../evidence/evidence-state.ts';

/** What one guarantee saw in one minute of inspection, written down when the minute is over; later records of it are added. */
export interface ClosedMinute {
  readonly guarantee: string;
  /** Start of the minute, ms. */
  readonly at: number;
  /** Units (or exposure) and nonconforming units (or nonconformities) to add. */
  readonly inspected: number;
  readonly nonconforming: number;
  /** Of the window when this was written, in the quantity's unit. */
  readonly estimate: number | undefined;
  readonly bound: number | undefined;
  readonly opposite: number | undefined;
  readonly state: EvidenceState;
}
