import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import type { History } from '../../core/view/history.ts';

/** Where times and values of a history stand in a drawing, px. */
export interface HistoryFrame {
  readonly width: number;
  readonly left: number;
  readonly right: number;
  /** Panel of bound and estimate. */
  readonly top: number;
  readonly bottom: number;
  readonly low: number;
  readonly high: number;
  readonly xOf: (at: number) => number;
  readonly yOf: (value: number) => number;
  readonly timeOf: (x: number) => number;
}

/** How many times the way from target to line the drawing may show on either side of the line. */
const mostSpans = 4;

/** Lowest and highest value drawn: target, line and what the data ask for, but never so far that the line's surroundings shrink to nothing. */
export function valueRange(card: Pick<GuaranteeCard, 'guaranteeLine' | 'target' | 'scale'>, history: History): readonly [number, number] {
  const { guaranteeLine: line, target } = card;
  const span = Math.abs(line - target) || Math.abs(line) * 0.5 || 1;
  const values = [...history.bound, ...history.estimate].filter((value) => value !== null);
  const least = values.reduce((low, value) => Math.min(low, value), Math.min(line, target));
  const most = values.reduce((high, value) => Math.max(high, value), Math.max(line, target));
  const low = Math.max(least - span * 0.15, line - mostSpans * span);
  const high = Math.min(most + span * 0.15, line + mostSpans * span);
  if (card.scale.kind === 'measure') return [low, high];
  return [Math.max(0, low), card.scale.kind === 'share' ? Math.min(1, high) : high];
}

/** @param labelWidth of the widest figure at the left, px */
export function historyFrame(width: number, card: GuaranteeCard, history: History, labelWidth: number): HistoryFrame {
  const narrow = width < 560;
  const left = narrow ? 8 : Math.max(84, labelWidth + 12);
  const right = width - (narrow ? 8 : 104);
  const top = 26;
  const bottom = top + (narrow ? 190 : 250);
  const [low, high] = valueRange(card, history);
  const { from, to } = history;
  return {
    width, left, right, top, bottom, low, high,
    xOf: (at) => left + ((at - from) / Math.max(1, to - from)) * (right - left),
    yOf: (value) => bottom - ((value - low) / (high - low || 1)) * (bottom - top),
    timeOf: (x) => from + ((x - left) / Math.max(1, right - left)) * (to - from),
  };
}
