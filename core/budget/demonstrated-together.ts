import { requireInside } from '../bound/out-of-domain.ts';
import type { Tail } from '../units.ts';

/**
 * Which of many guarantees are demonstrated at one moment, said together: of all that are named, the
 * expected share of wrong ones is at most `tail`, whatever ties the lines together.
 *
 * @param logEvidence ln of the evidence of each guarantee as it stands at that moment (not its highest so far); one
 *   that is not a number is never named, but counts among the many
 * @param tail share of wrong claims among those made that is accepted on average, above 0, below 1
 * @returns places of the demonstrated ones in the list, the strongest first
 * @throws OutOfDomain
 * @coverage false discovery rate at most tail, at a moment chosen in whatever way
 * @source e-BH, R. Wang, A. Ramdas 2022, arXiv 2009.02824 (abstract read)
 */
export function demonstratedTogether(logEvidence: readonly number[], tail: Tail): number[] {
  requireInside('tail', tail);
  const claims = logEvidence.map((evidence, place) => ({ evidence, place })).filter(({ evidence }) => !Number.isNaN(evidence));
  claims.sort((a, b) => (a.evidence === b.evidence ? a.place - b.place : b.evidence - a.evidence));
  const asked = Math.log(logEvidence.length) - Math.log(tail);
  const weakest = claims.findLastIndex(({ evidence }, above) => evidence >= asked - Math.log(above + 1));
  return claims.slice(0, weakest + 1).map(({ place }) => place);
}
