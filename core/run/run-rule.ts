import type { RisingClaim } from './rising-claim.ts';

/** What a run of counts is judged by at all looks; sizes are units, or exposure for a rate. */
export interface RunRule {
  /** Smallest size at which a faultless run demonstrates the line. */
  readonly least: number;
  readonly demonstrated: RisingClaim;
  readonly notViolated: RisingClaim;
  /** The same of the line moved in by the return distance of the crossing and of the violation rule. */
  readonly backFromCrossing: RisingClaim;
  readonly backFromViolation: RisingClaim;
  /** ln of the evidence that the line is kept, and that it is broken. */
  readonly lnDemonstrated: (size: number, count: number) => number;
  readonly lnViolated: (size: number, count: number) => number;
  /** Bounds at all looks in the quantity's unit: the upper at the guarantee's level, the lower at the violation rule's. */
  readonly upper: (size: number, count: number) => number;
  readonly lower: (size: number, count: number) => number;
  /** Smallest size at which this count demonstrates the line; Infinity if none. */
  readonly sizeToDemonstrate: (count: number) => number;
  /** Size that the quantity is told for: 1 unit for a fraction, the promised exposure for a rate. */
  readonly per: number;
  /** Largest size there is: the units of a lot. */
  readonly most: number;
}
