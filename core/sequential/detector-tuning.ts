import { OutOfDomain, requireInside, requirePositive } from '../bound/out-of-domain.ts';

/** Sizes of change the detector is on the watch for, as multiples of the baseline; all weigh the same. */
export const usualRatios: readonly number[] = [1.5, 2, 3, 5, 10, 20];

/** How a detector of a risen rate is set; arrays hold one number per ratio, in the order of the ratios. */
export interface DetectorTuning {
  /** ln of the factor for each unit (or unit of exposure) in which nothing was found, turned positive */
  readonly down: readonly number[];
  /** ln of the factor for each nonconforming unit (or nonconformity), on top of its own share of `down` */
  readonly up: readonly number[];
  /** factor for one nonconforming unit judged by itself */
  readonly once: readonly number[];
  /** level at which it alarms: the units (or exposure) between false calls that are guaranteed */
  readonly threshold: number;
  /** level each ratio rests at while units pass one by one and nothing is found */
  readonly rests: readonly number[];
  /** their average: where the detector rests */
  readonly rest: number;
}

/**
 * A detector of a risen nonconforming fraction.
 *
 * @param baseline the guarantee line, or the declared normal rate; above 0, below 1
 * @param unitsBetweenFalseCalls on average at least this many units pass between false calls, as long as each unit's
 *   chance given the past is at most the baseline; above the rest level (about 0.7 / baseline)
 * @param ratios each above 1; those that would take the usual ones past a fraction of 1 are left out
 * @throws OutOfDomain
 * @coverage run length: mean units to a false call at least unitsBetweenFalseCalls; P(false call within T units) <= T over it
 * @source mixture Shiryaev-Roberts e-detector, J. Shin, A. Ramdas, A. Rinaldo (abstract read); argument re-derived
 */
export function fractionDetector(baseline: number, unitsBetweenFalseCalls: number, ratios?: readonly number[]): DetectorTuning {
  requireInside('baseline', baseline);
  const watched = ratios ?? usualRatios.filter((ratio) => ratio * baseline < 1);
  requireRatios(watched, 1 / baseline);
  const down = watched.map((ratio) => Math.log1p(-baseline) - Math.log1p(-ratio * baseline));
  const up = watched.map((ratio, k) => Math.log(ratio) + (down[k] as number));
  const rests = down.map((b) => 1 / Math.expm1(b));
  const rest = averageOf(rests);
  requireAbove('unitsBetweenFalseCalls', unitsBetweenFalseCalls, rest);
  return { down, up, once: watched, threshold: unitsBetweenFalseCalls, rests, rest };
}

/**
 * A detector of a risen rate of nonconformities; as `fractionDetector`, with exposure for units.
 *
 * @param baseline nonconformities per unit of exposure, above 0
 * @param exposureBetweenFalseCalls above the rest level (about 0.7 / baseline)
 * @param ratios each above 1
 * @throws OutOfDomain
 * @coverage run length: mean exposure to a false call at least exposureBetweenFalseCalls
 * @source as `fractionDetector`, with Poisson likelihood ratios
 */
export function rateDetector(baseline: number, exposureBetweenFalseCalls: number, ratios: readonly number[] = usualRatios): DetectorTuning {
  requirePositive('baseline', baseline);
  requireRatios(ratios, Infinity);
  const down = ratios.map((ratio) => (ratio - 1) * baseline);
  const up = ratios.map((ratio) => Math.log(ratio));
  const rest = averageOf(down.map((b) => 1 / b));
  requireAbove('exposureBetweenFalseCalls', exposureBetweenFalseCalls, rest);
  const once = up.map((u, k) => Math.exp(u - (down[k] as number)));
  return { down, up, once, threshold: exposureBetweenFalseCalls, rests: down.map((b) => 1 / Math.expm1(b)), rest };
}

function averageOf(levels: readonly number[]): number {
  return levels.reduce((sum, level) => sum + level, 0) / levels.length;
}

function requireRatios(ratios: readonly number[], below: number): void {
  if (ratios.length === 0) throw new OutOfDomain('ratios', ratios, 'one ratio or more that leave the fraction below 1');
  for (const ratio of ratios) {
    if (!(ratio > 1 && ratio < below)) throw new OutOfDomain('ratios', ratio, `numbers above 1 and below ${below}`);
  }
}

function requireAbove(argument: string, value: number, rest: number): void {
  if (!(value > rest && value < Infinity)) throw new OutOfDomain(argument, value, `a finite number above the rest level ${rest}`);
}
