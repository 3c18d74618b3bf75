import { demonstratedCount, violatedCount } from '../../core/bound/critical-count.ts';
import { lookRules } from '../../core/describe/bound-methods.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import { briefShare, confidenceText, shareText } from '../../core/describe/share-text.ts';
import { windowProposal } from '../../core/plant/window-proposal.ts';
import { highestNormalRate, lostShare, steadyWindow, type SteadyWish } from '../../core/run-length/steady-window.ts';
import type { Fraction } from '../../core/units.ts';
import { curvePicture } from './curve-picture.ts';
import { percent } from './demonstration-answer.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** The window a limit sheet is proposed with when nothing else is said: a well line is lost 1 % of the time. */
const proposedLost = 0.01;
const mostUnits = 1e9;

/** Which window keeps a line at this normal rate demonstrated. @param normal 0 to below the line */
export function windowFor(wish: SteadyWish, normal: number): PlanAnswer {
  const steady = steadyWindow(wish, normal);
  const proposed = wish.lost === proposedLost ? windowProposal(wish.line as Fraction, normal as Fraction, wish.tail, mostUnits) : undefined;
  const answer = windowOf(wish, proposed ?? steady);
  const kept = `a line at its normal rate of ${briefShare(normal)} demonstrated ${percent(1 - wish.lost)} of the time`;
  const sentence =
    proposed === undefined
      ? `A window of ${writtenNumber(steady, 15)} units, and every larger one, keeps ${kept}.`
      : `A window of ${writtenNumber(proposed, 15)} units keeps ${kept}; so does every window from ${writtenNumber(steady, 15)} units up.`;
  return { ...answer, sentences: [sentence, ...answer.sentences], json: { ...answer.json, normal, proposed: proposed ?? null, steady } };
}

/** What a given window does: up to which normal rate it keeps a line demonstrated. @param units whole, 1 or more */
export function windowOf(wish: SteadyWish, units: number): PlanAnswer {
  const { line, tail, lost } = wish;
  const demonstrated = demonstratedCount(units, line, tail);
  const violated = violatedCount(units, line, tail);
  const highest = highestNormalRate(wish, units);
  const shares = [0.1, 0.25, 0.5, 0.75, 1].map((part) => Number((part * line).toPrecision(12)));
  const size = `${writtenNumber(units, 15)} units`;
  return {
    sentences: [
      demonstrated < 0
        ? `Not even ${size} without a nonconforming one demonstrate ${briefShare(line)} at ${confidenceText(tail)}: the window is too small.`
        : `In ${size} up to ${demonstrated} nonconforming demonstrate at most ${briefShare(line)} at ${confidenceText(tail)}, from ${violated} on they show it violated.`,
      ...(demonstrated < 0 ? [] : [`It stays demonstrated ${percent(1 - lost)} of the time up to a normal rate of ${shareText(highest, 'down')}.`]),
    ],
    table: { head: ['true rate', 'of the line', 'not demonstrated'], rows: shares.map((rate) => [briefShare(rate), `${writtenNumber((100 * rate) / line, 3)} %`, percent(lostShare(units, rate, line, tail))]) },
    picture: curvePicture({
      chance: (rate) => (rate <= 0 ? Number(demonstrated < 0) : lostShare(units, Math.min(rate, 1 - 1e-9), line, tail)),
      from: 0,
      to: Math.min(1, 1.5 * line),
      line,
      label: 'true nonconforming fraction',
      title: `Share of the time not demonstrated, with a window of ${size}`,
      written: briefShare,
    }),
    notes: [
      ['Looks', lookRules.one],
      ['Mind', 'Loss of demonstration is a status; how often a rule calls falsely when watched all the time: vouchline plan alarm.'],
    ],
    json: { plan: 'window', line, tail, confidence: confidenceText(tail), lost, units, demonstratedCount: demonstrated, violatedCount: violated, highestNormalRate: highest, lostShares: shares.map((rate) => ({ rate, lost: lostShare(units, rate, line, tail) })), looks: lookRules.one },
  };
}
