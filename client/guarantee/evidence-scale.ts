import type { RunView } from '../../core/view/run-view.ts';

/** Where evidence is drawn: powers of ten on the y axis, what lies beyond stands on the edge. */
export interface EvidenceScale {
  /** Lowest and highest power of ten drawn. */
  readonly low: number;
  readonly high: number;
  /** y in px of a power of ten. */
  readonly yOf: (power: number) => number;
  /** Powers that get a line and a label. */
  readonly ticks: readonly number[];
}

/** Powers below this say nothing more: evidence that has gone there is far from any claim. */
const lowest = -2;
/** Powers drawn above the higher of the two thresholds. */
const above = 1.5;

export function evidenceScale({ enoughKept, enoughBroken }: Pick<RunView, 'enoughKept' | 'enoughBroken'>, top: number, bottom: number): EvidenceScale {
  const high = Math.max(enoughKept, enoughBroken) + above;
  const yOf = (power: number): number => bottom - ((Math.min(high, Math.max(lowest, power)) - lowest) / (high - lowest)) * (bottom - top);
  const ticks = Array.from({ length: Math.floor(high) - lowest + 1 }, (_, place) => lowest + place);
  return { low: lowest, high, yOf, ticks };
}

/** An SVG path through the marks, held at the edges of the scale; empty for less than two. */
export function evidencePath(at: readonly number[], powers: readonly number[], xOf: (at: number) => number, yOf: (power: number) => number): string {
  if (at.length < 2) return '';
  return at.map((moment, place) => `${place === 0 ? 'M' : 'L'}${xOf(moment).toFixed(1)} ${yOf(powers[place] ?? 0).toFixed(1)}`).join('');
}
