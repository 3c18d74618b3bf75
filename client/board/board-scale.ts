import { svg, type SVGTemplateResult } from 'lit';
import type { Formats } from '../format.ts';
import { ticks, type AllowanceScale } from './allowance-scale.ts';

/** The board's one scale: ticks by name, as many as there is room for; the guarantee line always. */
export function boardScale(scale: AllowanceScale, formats: Formats, typePx: number): SVGTemplateResult {
  const height = Math.round(typePx * 2.1);
  const middle = typePx * 4.4;
  let free = Number.NEGATIVE_INFINITY;
  const shown = ticks.filter((at) => {
    const { x } = scale.placeOf(at);
    const clear = at === 1 || (Math.abs(x - scale.lineX) > middle + typePx * 1.4 && x - free > typePx * 3.2 && x > typePx * 1.6);
    if (clear) free = x;
    return clear;
  });
  return svg`<svg class="drawing" width=${scale.width} height=${height} aria-hidden="true">
    ${shown.map((at) => {
      const { x } = scale.placeOf(at);
      const line = at === 1;
      const words = line ? 'guarantee line' : at === 0 ? 'target' : formats.percent(at);
      return svg`<text class=${line ? 'name' : 'tick-name'} x=${x} y=${typePx * 1.15} text-anchor="middle" font-size=${typePx}>${words}</text>
        <line class=${line ? 'line' : 'tick'} x1=${x} x2=${x} y1=${typePx * 1.5} y2=${height}></line>`;
    })}
  </svg>`;
}
