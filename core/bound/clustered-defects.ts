import { betaOdds } from '../numerics/beta-quantile.ts';
import type { Fraction, Tail } from '../units.ts';
import type { Batch } from './dispersion.ts';
import { gapsOf } from './gap-diagnostic.ts';
import { fractionOfOdds, requireSample } from './nonconforming-fraction.ts';
import { OutOfDomain, requirePositive, requireWhole } from './out-of-domain.ts';

/*
 * What can be declared about defects that do not come singly. Each is a statement made in advance on
 * the limit sheet; none is estimated from the window that is judged with it.
 */

/**
 * Nonconforming units closer than a declared gap count as one event: the positions of the events,
 * each where its first unit stood.
 *
 * @param positions numbers of the nonconforming units, rising
 * @param gap units; a unit at most this far from the one before it belongs to the same event; whole, 1 or more
 * @throws OutOfDomain naming the argument
 * @source methods, section 8, remedy 1
 */
export function eventsOf(positions: readonly number[], gap: number): readonly number[] {
  requireWhole('gap', gap, 1);
  const gaps = gapsOf(positions);
  return positions.filter((_, i) => i === 0 || (gaps[i - 1] ?? 0) > gap);
}

/**
 * The line for the rate of events that belongs to a line for units.
 *
 * @param line guaranteed fraction of units
 * @param clusterSize mean units in an event, from 100 past events or more; 1 or more
 * @throws OutOfDomain
 * @source methods, section 8, remedy 1
 */
export function eventLine(line: number, clusterSize: number): Fraction {
  if (!(clusterSize >= 1 && clusterSize < Infinity)) throw new OutOfDomain('clusterSize', clusterSize, 'a finite number, 1 or more');
  return (line / clusterSize) as Fraction;
}

/**
 * Upper bound with a planned design effect D: the exact bound of a sample 1/D the size.
 *
 * @param nonconforming whole, 0 to inspected
 * @param inspected whole, 1 or more
 * @param designEffect 1 or more, declared from history (its upper 90 % limit)
 * @param tail all of alpha in one tail, above 0, below 1
 * @returns in [nonconforming / inspected, 1] for tails up to 1/2; exactly 1 if every unit is nonconforming
 * @throws OutOfDomain naming the argument; NoConvergence
 * @coverage measured at 0.97 or more for 95 % with the right D (methods), not proved; one look fixed in advance
 * @source methods, section 8, remedy 3; effective sample size after L. Kish 1965 (memory)
 */
export function designedUpper(nonconforming: number, inspected: number, designEffect: number, tail: Tail): Fraction {
  requireDesign(nonconforming, inspected, designEffect, tail);
  if (nonconforming === inspected) return 1 as Fraction;
  const [x, left] = [nonconforming / designEffect, (inspected - nonconforming) / designEffect];
  return fractionOfOdds(1 / betaOdds(left, x + 1, tail));
}

/** Lower bound likewise; exactly 0 without nonconforming units; all else as of `designedUpper`. @coverage as there */
export function designedLower(nonconforming: number, inspected: number, designEffect: number, tail: Tail): Fraction {
  requireDesign(nonconforming, inspected, designEffect, tail);
  if (nonconforming === 0) return 0 as Fraction;
  const [x, left] = [nonconforming / designEffect, (inspected - nonconforming) / designEffect];
  return fractionOfOdds(betaOdds(x, left + 1, tail));
}

/**
 * The lot as the unit: how many lots held more nonconforming units than allowed. Bounds on the
 * fraction of such lots assume nothing about what happens within a lot.
 *
 * @param lots one or more
 * @param allowed nonconforming units a lot may hold and still conform; whole, 0 or more
 * @throws OutOfDomain naming the argument
 * @source methods, section 8, remedy 4
 */
export function lotsAsUnits(lots: readonly Batch[], allowed: number): Batch {
  requireWhole('allowed', allowed, 0);
  if (lots.length === 0) throw new OutOfDomain('lots', '(none)', 'one lot or more');
  return { nonconforming: lots.filter(({ nonconforming }) => nonconforming > allowed).length, inspected: lots.length };
}

function requireDesign(nonconforming: number, inspected: number, designEffect: number, tail: number): void {
  requireSample(nonconforming, inspected, tail);
  requirePositive('designEffect', designEffect);
  if (designEffect < 1) throw new OutOfDomain('designEffect', designEffect, 'a number, 1 or more');
}
