/** What a screen shows of a change detector. */
export interface DetectorView {
  /** How far it has gone on the way to its alarm, 0 to 1. */
  readonly gauge: number;
  readonly inARowToAlarm: number | undefined;
  readonly conformingToHalfWay: number | undefined;
  readonly betweenFalseCalls: number;
  readonly baseline: number;
}
