import type { Guarantee } from '../plant/guarantee.ts';
import type { Tail } from '../units.ts';

/** Return distances and the level of the opposite bound, as the rules of a guarantee set them. */
export interface RuleLevels {
  readonly crossingDistance: number;
  readonly violationDistance: number;
  readonly violationTail: Tail;
}

/** Without a violation rule the opposite bound is still shown, at the guarantee's own level. */
export function levelsOf(guarantee: Guarantee): RuleLevels {
  let levels: RuleLevels = { crossingDistance: 0, violationDistance: 0, violationTail: guarantee.tail };
  for (const rule of guarantee.rules) {
    if (rule.kind === 'crossing') levels = { ...levels, crossingDistance: rule.return.distance };
    if (rule.kind === 'violation') levels = { ...levels, violationDistance: rule.return.distance, violationTail: rule.tail };
  }
  return levels;
}

/** The line moved in by a share of the way to the target: lower for 'at most', higher for 'at least'. */
export function movedIn(line: number, target: number, distance: number): number {
  return distance === 0 ? line : line + distance * (target - line);
}
