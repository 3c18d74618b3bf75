import { demonstratedNonconformities, violatedNonconformities } from '../../core/bound/critical-exposure.ts';
import { demonstratedCount, violatedCount } from '../../core/bound/critical-count.ts';
import { lookRules } from '../../core/describe/bound-methods.ts';
import { confidenceText, shareText } from '../../core/describe/share-text.ts';
import { windowProposal } from '../../core/plant/window-proposal.ts';
import { highestRateOverExposure, leastExposure, lostShareOfExposure, steadyExposure } from '../../core/run-length/steady-exposure.ts';
import { highestNormalRate, lostShare, steadyWindow, type SteadyWish } from '../../core/run-length/steady-window.ts';
import { writtenNumber } from '../../core/describe/rounded.ts';
import type { Fraction } from '../../core/units.ts';
import type { Counted } from './counted.ts';
import { curvePicture } from './curve-picture.ts';
import { percent } from './demonstration-answer.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** The window a limit sheet is proposed with when nothing else is said: a well line is lost 1 % of the time. */
const proposedLost = 0.01;
const mostUnits = 1e9;

/** Which window keeps a line at this normal rate demonstrated. @param normal 0 to below the line @throws OutOfDomain */
export function windowFor(wish: SteadyWish, normal: number, counted: Counted): PlanAnswer {
  const { line, tail, lost } = wish;
  const steady = counted.grain === 1 ? steadyWindow(wish, normal) : steadyExposure(wish, normal);
  const proposed = counted.grain !== 1 ? leastExposure(wish, normal) : lost === proposedLost ? windowProposal(line as Fraction, normal as Fraction, tail, mostUnits) : undefined;
  const answer = windowOf(wish, proposed ?? steady, counted);
  const kept = `a line at its normal rate of ${counted.rate(normal)} demonstrated ${percent(1 - lost)} of the time`;
  const sentence =
    proposed === undefined
      ? `A window of ${counted.size(steady)}, and every larger one, keeps ${kept}.`
      : `A window of ${counted.size(proposed)} keeps ${kept}; so does every window from ${counted.size(steady)} up.`;
  return { ...answer, sentences: [sentence, ...answer.sentences], json: { ...answer.json, normal, proposed: proposed ?? null, steady } };
}

/** What a given window does: up to which normal rate it keeps a line demonstrated. @param size above 0; of units whole, 1 or more */
export function windowOf(wish: SteadyWish, size: number, counted: Counted): PlanAnswer {
  const { line, tail, lost } = wish;
  const { things } = counted;
  const units = counted.grain === 1;
  const demonstrated = units ? demonstratedCount(size, line, tail) : demonstratedNonconformities(size, line, tail);
  const violated = units ? violatedCount(size, line, tail) : violatedNonconformities(size, line, tail);
  const highest = units ? highestNormalRate(wish, size) : highestRateOverExposure(wish, size);
  const lostAt = (rate: number): number => (units ? lostShare(size, Math.min(rate, 1 - 1e-9), line, tail) : lostShareOfExposure(size, rate, line, tail));
  const shares = [0.1, 0.25, 0.5, 0.75, 1].map((part) => Number((part * line).toPrecision(12)));
  const said = counted.size(size);
  return {
    sentences: [
      demonstrated < 0
        ? `Not even ${said} without a ${units ? 'nonconforming one' : 'nonconformity'} demonstrate ${counted.rate(line)} at ${confidenceText(tail)}: the window is too small.`
        : `In ${said} up to ${demonstrated} ${units ? 'nonconforming' : things} demonstrate at most ${counted.rate(line)} at ${confidenceText(tail)}, from ${violated} on they show it violated.`,
      ...(demonstrated < 0 ? [] : [`It stays demonstrated ${percent(1 - lost)} of the time up to a normal rate of ${units ? shareText(highest, 'down') : counted.rate(highest)}.`]),
    ],
    table: { head: ['true rate', 'of the line', 'not demonstrated'], rows: shares.map((rate) => [counted.rate(rate), `${writtenNumber((100 * rate) / line, 3)} %`, percent(lostAt(rate))]) },
    picture: curvePicture({
      chance: (rate) => (rate <= 0 ? Number(demonstrated < 0) : lostAt(rate)),
      from: 0,
      to: units ? Math.min(1, 1.5 * line) : 1.5 * line,
      line,
      label: units ? 'true nonconforming fraction' : 'true rate',
      title: `Share of the time not demonstrated, with a window of ${said}`,
      written: counted.rate,
    }),
    notes: [
      ['Looks', lookRules.one],
      ['Mind', 'Loss of demonstration is a status; how often a rule calls falsely when watched all the time: vouchline plan alarm.'],
    ],
    json: { plan: 'window', line, tail, confidence: confidenceText(tail), lost, ...(units ? { units: size } : { exposure: size, unit: counted.unit }), demonstratedCount: demonstrated, violatedCount: violated, highestNormalRate: highest, lostShares: shares.map((rate) => ({ rate, lost: lostAt(rate) })), looks: lookRules.one },
  };
}
