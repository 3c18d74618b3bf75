import { svg, type SVGTemplateResult } from 'lit';
import type { Priority } from '../../core/plant/guarantee.ts';

/** A shape for each priority in a 16 by 16 field: more strokes, more urgent. */
export function priorityMark(priority: Priority): SVGTemplateResult {
  const bars = { high: [3, 8, 13], medium: [5.5, 10.5], low: [8] }[priority];
  return svg`${bars.map((x) => svg`<path d="M${x} 2v12" stroke="currentColor" stroke-width="3"/>`)}`;
}
