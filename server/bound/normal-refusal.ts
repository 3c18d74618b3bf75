import { normalApproximationLower, normalApproximationUpper } from '../../core/bound/normal-approximation.ts';
import { fractionLower, fractionUpper } from '../../core/bound/nonconforming-fraction.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { shareText } from '../../core/describe/share-text.ts';
import { numberIn } from './given.ts';
import type { ToldRequest } from './told-request.ts';

/**
 * Why the normal approximation is not used, with the figure that it would give beside the exact one.
 *
 * @throws OutOfDomain naming the argument
 */
export function normalRefusal({ given, tail, side }: ToldRequest): string {
  const [x, n] = [numberIn(given, 'nonconforming'), numberIn(given, 'n')];
  const lower = side === 'lower';
  const approximate = (lower ? normalApproximationLower : normalApproximationUpper)(x, n, tail);
  const exact = shareText((lower ? fractionLower : fractionUpper)(x, n, tail), lower ? 'down' : 'up');
  if (approximate.ok) {
    return `--method normal is refused: it covers less than the confidence level it names. It would say ${shareText(approximate.value)}; the exact bound is ${exact}.`;
  }
  const { scarce, needed, wouldSay } = approximate.fault;
  const said = wouldSay >= 0 && wouldSay <= 1 ? shareText(wouldSay) : `${writtenNumber(wouldSay, 4)}, which is no share at all`;
  const why = scarce < needed ? `${scarce} of ${n} units are of the scarcer kind, and below ${needed} it is far off` : 'it reaches beyond what a share can be';
  return `--method normal is refused: ${why}. It would say ${said}; the exact bound is ${exact}.`;
}
