/** What a screen shows of a change detector. */
export interface DetectorView {
  readonly kind: 'mixture' | 'cusum';
  /** How far it has gone on the way to its alarm, 0 to 1; while its alarm stands, how far it is from normal. */
  readonly gauge: number;
  readonly alarmed: boolean;
  readonly inARowToAlarm: number | undefined;
  readonly conformingToHalfWay: number | undefined;
  /** Conforming units (or exposure) until its alarm returns: back at half way, and long enough after the alarm. */
  readonly toReturn: number | undefined;
  readonly betweenFalseCalls: number;
  readonly baseline: number;
  readonly against: 'line' | 'normal-rate';
  /** Why the distance between false calls does not hold now, and what to do; one or two sentences. */
  readonly doubt: string | undefined;
}
