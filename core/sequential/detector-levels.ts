import type { DetectorTuning } from './detector-tuning.ts';

/*
 * The arithmetic of the mixture Shiryaev-Roberts detector on its bare levels, one per ratio, changed in
 * place. The stored state and the simulations both go through it, so a figure shown before going live
 * is about the very detector that runs.
 */

/** Takes the levels over trials in which nothing was found, each of the same weight (units or exposure), in one step. */
export function settle(levels: number[], tuning: DetectorTuning, trials: number, weight: number): void {
  for (let k = 0; k < levels.length; k++) {
    const fall = (tuning.down[k] as number) * weight;
    const lost = -Math.expm1(-fall * trials);
    const rest = weight === 1 ? (tuning.rests[k] as number) : weight / Math.expm1(fall);
    levels[k] = (levels[k] as number) * (1 - lost) + rest * lost;
  }
}

/**
 * Takes the levels over one trial with nonconforming units (or nonconformities) in it.
 *
 * @returns the level of the mixture, to be held against the threshold
 */
export function strike(levels: number[], tuning: DetectorTuning, found: number, weight: number): number {
  const alone = found === 1 && weight === 1;
  let sum = 0;
  for (let k = 0; k < levels.length; k++) {
    const factor = alone ? (tuning.once[k] as number) : Math.exp((tuning.up[k] as number) * found - (tuning.down[k] as number) * weight);
    const level = ((levels[k] as number) + weight) * factor;
    levels[k] = level;
    sum += level;
  }
  return sum / levels.length;
}
