import { nothing, svg, type SVGTemplateResult } from 'lit';
import type { EvidenceState } from '../../core/evidence/evidence-state.ts';
import type { GuaranteeView } from '../../core/view/guarantee-view.ts';
import type { Tone } from '../attention.ts';
import { ticks, type AllowanceScale, type Place } from './allowance-scale.ts';

export interface LanePlotInput {
  readonly scale: AllowanceScale;
  readonly height: number;
  readonly view: GuaranteeView;
  readonly tone: Tone;
}

/** Measures of the marks, px: they grow with the lane, and loud lanes are drawn with a broader pen. */
interface Pen {
  readonly y: number;
  readonly body: number;
  readonly head: number;
  readonly dot: number;
}

function penOf(height: number, loud: boolean): Pen {
  const body = Math.min(22, Math.max(loud ? 4 : 2.5, height * (loud ? 0.085 : 0.06)));
  const dot = Math.min(height * 0.2, Math.max(3.5, body * 1.25));
  return { y: Math.round(height * (height < 40 ? 0.42 : 0.45)), body, head: Math.min(height * 0.3, body * 1.9), dot };
}

/** The ground all lanes share: the land beyond the line, the ticks, and the one guarantee line itself. */
export function laneGround(scale: AllowanceScale, height: number): SVGTemplateResult {
  return svg`
    <rect class="beyond" x=${scale.lineX} y="0" width=${scale.width - scale.lineX} height=${height}></rect>
    ${ticks.map((at) => (at === 1 ? nothing : svg`<line class="tick" x1=${scale.placeOf(at).x} x2=${scale.placeOf(at).x} y1="0" y2=${height}></line>`))}`;
}

const guaranteeLine = (scale: AllowanceScale, height: number): SVGTemplateResult =>
  svg`<line class="line" x1=${scale.lineX} x2=${scale.lineX} y1="0" y2=${height}></line>`;

/** Where the tip stood: the oldest faintest, so that one sees it come or go. */
function trail(scale: AllowanceScale, pen: Pen, height: number, allowances: readonly number[]): SVGTemplateResult {
  const top = pen.y + pen.head + Math.max(2, height * 0.05);
  const long = Math.max(3, height * 0.13);
  const first = 12 - allowances.length;
  return svg`<g class="trail">${allowances.map((at, index) => {
    const { x } = scale.placeOf(at);
    return svg`<line x1=${x} x2=${x} y1=${top} y2=${top + long} stroke-width=${Math.max(1.5, pen.body * 0.4)} opacity=${0.15 + (0.75 * (first + index + 1)) / 12}></line>`;
  })}</g>`;
}

/** A tip beyond the drawing's end carries a second chevron: it goes on. */
function tip(place: Place, pen: Pen): SVGTemplateResult {
  const { y, head } = pen;
  const x = place.beyond ? place.x - head * 0.7 : place.x;
  const more = place.beyond
    ? svg`<path class="more" d="M${place.x - head * 0.45} ${y - head} L${place.x + head * 0.25} ${y} L${place.x - head * 0.45} ${y + head}"></path>`
    : nothing;
  return svg`<path class="tip" d="M${x - head * 1.15} ${y - head} L${x} ${y} L${x - head * 1.15} ${y + head} Z"></path>${more}`;
}

/** Dotted while gathering, dashed when unknown; the rhythm follows the pen. */
function dashes(state: EvidenceState, body: number): string | typeof nothing {
  if (state === 'gathering') return `0.1 ${body * 2.2}`;
  return state === 'unknown' ? `${body * 2} ${body * 1.4}` : nothing;
}

function whisker(scale: AllowanceScale, pen: Pen, from: number, to: number | undefined, state: EvidenceState): SVGTemplateResult {
  const start = scale.placeOf(from).x;
  const end = to === undefined ? undefined : scale.placeOf(to);
  const stop = end === undefined ? scale.width - 6 : Math.max(start, end.x - pen.head * 0.9);
  return svg`<line class="whisker" x1=${start} x2=${stop} y1=${pen.y} y2=${pen.y} stroke-width=${state === 'gathering' ? pen.body * 0.8 : pen.body} stroke-dasharray=${dashes(state, pen.body)}></line>
    ${end === undefined ? nothing : tip(end, pen)}`;
}

/** The opposite bound, upright, where it too has passed the line. */
function opposite(scale: AllowanceScale, pen: Pen, at: number | undefined): SVGTemplateResult | typeof nothing {
  if (at === undefined || !(at > 1)) return nothing;
  const { x } = scale.placeOf(at);
  const half = pen.head * 1.5;
  return svg`<line class="opposite" x1=${x} x2=${x} y1=${pen.y - half} y2=${pen.y + half} stroke-width=${Math.max(3, pen.body * 0.8)}></line>`;
}

/** One lane's drawing in its own px, so that no shape is ever stretched. */
export function lanePlot({ scale, height, view, tone }: LanePlotInput): SVGTemplateResult {
  const pen = penOf(height, tone === 'harm' || tone === 'care');
  const { estimate, bound } = view.allowance;
  const start = estimate ?? bound;
  return svg`${laneGround(scale, height)}
    ${guaranteeLine(scale, height)}
    <g class=${`marks ${tone} ${view.state}`}>
      ${trail(scale, pen, height, view.allowance.trail)}
      ${start === undefined ? nothing : whisker(scale, pen, start, bound, view.state)}
      ${opposite(scale, pen, view.allowance.opposite)}
      ${estimate === undefined ? nothing : svg`<circle class="dot" cx=${scale.placeOf(estimate).x} cy=${pen.y} r=${pen.dot} stroke-width=${Math.max(2, pen.body * 0.6)}></circle>`}
    </g>`;
}
