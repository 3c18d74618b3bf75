import type { Side } from '../evidence/mean-method.ts';
import type { Bounds } from '../evidence/evidence.ts';
import type { Tail } from '../units.ts';

/** One way of judging the mean of a run at all looks; it takes the values one by one. */
export interface MeanLaw {
  readonly values: number;
  admit(value: number): void;
  clear(): void;
  /** Values below which even the best could not put the bound on the good side. */
  readonly least: number;
  /** ln of the evidence that the mean is on that side of the line. */
  lnOn(side: Side): number;
  /** Whether that evidence is enough at the side's level; what the record path asks. */
  isOn(side: Side): boolean;
  /** Whether the bound of that side stands on that side of a line moved in. */
  stands(side: Side, line: number): boolean;
  /** Estimate and the bounds of both sides. */
  bounds(): { readonly estimate: Bounds['estimate']; readonly above: number | undefined; readonly below: number | undefined };
  snapshot(): unknown;
  restore(from: never): void;
}

/** Levels of a mean's run: of the bound that is compared with the line, and of the opposite one. */
export interface MeanLevels {
  readonly line: number;
  /** ln(1 / tail) for the evidence of each side. */
  readonly enough: Readonly<Record<Side, number>>;
  readonly tail: Readonly<Record<Side, Tail>>;
}
