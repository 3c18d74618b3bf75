import { html, LitElement, nothing, svg, type SVGTemplateResult, type TemplateResult } from 'lit';
import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import type { History, Strip } from '../../core/view/history.ts';
import { written, type Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { ElementWidth } from '../parts/element-width.ts';
import { counted, promisedLimit, stateWord } from '../words.ts';
import { timeTicks, valueTicks, zoneOffset } from './axis-ticks.ts';
import { historyChartStyle } from './history-chart-style.ts';
import { historyEvent, stoppedSpans } from './history-event.ts';
import { historyFrame, valueRange, type HistoryFrame } from './history-frame.ts';
import { statePaths, valuePath } from './history-paths.ts';

const stripHeight = 44;
const eventHeight = 26;
const mostTicks = 5;
const pixelsALetter = 7;

/** What one step holds, in words. */
function inStep(formats: Formats, { scale }: GuaranteeCard, inspected: number, nonconforming: number): string {
  switch (scale.kind) {
    case 'share':
      return `${counted(formats, inspected, 'unit')}, ${formats.count(nonconforming)} nonconforming in this step`;
    case 'rate':
      return `${counted(formats, nonconforming, 'nonconformity', 'nonconformities')} in ${formats.count(inspected)} ${scale.unit} in this step`;
    case 'measure':
      return `${counted(formats, inspected, 'value')} in this step`;
  }
}

/** Bound, estimate and line over time; below them, on the same axis, what was nonconforming and what happened. */
export class HistoryChart extends LitElement {
  static override properties = {
    card: { attribute: false },
    history: { attribute: false },
    strip: { attribute: false },
    formats: { attribute: false },
    timeZone: { attribute: false },
    chosen: { state: true },
  };

  static override styles = [base, historyChartStyle];

  declare card: GuaranteeCard | undefined;
  declare history: History | undefined;
  declare strip: Strip | undefined;
  declare formats: Formats | undefined;
  declare timeZone: string;
  /** Step the reader points at; undefined: the newest. */
  declare chosen: number | undefined;

  readonly #width = new ElementWidth(this);

  protected override render(): TemplateResult | typeof nothing {
    const { card, history, formats } = this;
    if (card === undefined || history === undefined || formats === undefined || this.#width.px === 0) return html`<div class="room"></div>`;
    if (history.at.length === 0) return html`<p class="none quiet">No records in this span.</p>`;
    const [low, high] = valueRange(card, history);
    const labels = valueTicks(low, high, mostTicks).map((value) => written(formats.figure(card, value)).length);
    const frame = historyFrame(this.#width.px, card, history, pixelsALetter * Math.max(0, ...labels));
    const step = Math.min(this.chosen ?? history.at.length - 1, history.at.length - 1);
    const height = frame.bottom + 14 + stripHeight + eventHeight + 26;
    return html`
      <p class="readout" aria-hidden="true">${this.#readout(step, card, history, formats)}</p>
      <div class="chart" tabindex="0" role="slider" aria-label="Bound over time: step with the arrow keys" aria-valuemin="0" aria-valuemax=${history.at.length - 1}
        aria-valuenow=${step} aria-valuetext=${this.#readout(step, card, history, formats)} @keydown=${this.#onKey}
        @pointermove=${(event: PointerEvent) => { this.#point(event, frame, history); }} @pointerleave=${() => { this.chosen = undefined; }}>
        <svg width=${frame.width} height=${height} aria-hidden="true">
          <defs><clipPath id="panel"><rect x=${frame.left} y=${frame.top - 8} width=${frame.right - frame.left} height=${frame.bottom - frame.top + 8}></rect></clipPath>
          <pattern id="stopped" width="7" height="7" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><line x1="0" x2="0" y1="0" y2="7" class="hatch"></line></pattern></defs>
          ${this.#ground(frame, card, history, formats)} ${this.#series(frame, card, history, formats)} ${this.#values(frame, card, formats)} ${this.#strip(frame, card, history)} ${this.#events(frame, history, formats)}
          ${this.chosen === undefined ? nothing : svg`<line class="cursor" x1=${frame.xOf(history.at[step] ?? 0)} x2=${frame.xOf(history.at[step] ?? 0)} y1=${frame.top} y2=${frame.bottom + 14 + stripHeight}></line>`}
        </svg>
      </div>`;
  }

  #readout(step: number, card: GuaranteeCard, history: History, formats: Formats): string {
    const at = history.at[step];
    if (at === undefined) return '';
    const figure = (value: number | null | undefined): string => written(formats.figureBesideLine(card, value ?? undefined));
    const state = history.state[step];
    return [
      formats.moment(at),
      `bound ${figure(history.bound[step])}`,
      `estimate ${figure(history.estimate[step])}`,
      inStep(formats, card, history.inspected[step] ?? 0, history.nonconforming[step] ?? 0),
      ...(state === undefined ? [] : [stateWord[state].toLowerCase()]),
    ].join(', ');
  }

  #ground(frame: HistoryFrame, card: GuaranteeCard, history: History, formats: Formats): SVGTemplateResult {
    const { left, right, top, bottom } = frame;
    const lineY = frame.yOf(card.guaranteeLine);
    const [badTop, badBottom] = card.side === 'at-most' ? [top, lineY] : [lineY, bottom];
    const times = timeTicks(history.from, history.to, Math.max(2, Math.floor((right - left) / 90)), zoneOffset(this.timeZone, history.to));
    const longSpan = history.to - history.from > 36 * 3_600_000;
    return svg`
      <rect class="beyond" x=${left} y=${badTop} width=${right - left} height=${Math.max(0, badBottom - badTop)}></rect>
      ${stoppedSpans(history.events, history.to).map(([a, b]) => svg`<rect fill="url(#stopped)" x=${frame.xOf(a)} y=${top} width=${Math.max(1, frame.xOf(b) - frame.xOf(a))} height=${bottom + 14 + stripHeight - top}></rect>`)}
      ${valueTicks(frame.low, frame.high, mostTicks).map((value) => svg`<line class="grid" x1=${left} x2=${right} y1=${frame.yOf(value)} y2=${frame.yOf(value)}></line>`)}
      ${times.map((at) => svg`<line class="grid" x1=${frame.xOf(at)} x2=${frame.xOf(at)} y1=${top} y2=${bottom + 14 + stripHeight}></line>
        <text class="tick" x=${frame.xOf(at)} y=${bottom + 14 + stripHeight + eventHeight + 17} text-anchor="middle">${longSpan ? formats.day(at) : formats.minute(at)}</text>`)}`;
  }

  #series(frame: HistoryFrame, card: GuaranteeCard, history: History, formats: Formats): SVGTemplateResult {
    const lineY = frame.yOf(card.guaranteeLine);
    const last = (values: readonly (number | null)[]): number | undefined => values.findLast((value) => value !== null) ?? undefined;
    return svg`
      <g clip-path="url(#panel)">
        <path class="estimate" d=${valuePath(frame, history.at, history.estimate)}></path>
        <path class="opposite" d=${valuePath(frame, history.at, history.opposite)}></path>
        ${statePaths(frame, history.at, history.bound, history.state).map((path) => svg`<path class="bound ${path.state}" d=${path.d}></path>`)}
      </g>
      <line class="line" x1=${frame.left} x2=${frame.right} y1=${lineY} y2=${lineY}></line>
      <text class="line-name" x=${frame.left + (frame.left === 8 ? frame.right - frame.left : 6)} y=${lineY - 6} text-anchor=${frame.left === 8 ? 'end' : 'start'}>promised: ${promisedLimit(formats, card)}</text>
      ${frame.left === 8 ? nothing : this.#names(frame, [['bound', last(history.bound)], ['estimate', last(history.estimate)], ['opposite bound', last(history.opposite)]])}`;
  }

  /** Figures of the grid; in a narrow drawing they stand inside, over the lines. */
  #values(frame: HistoryFrame, card: GuaranteeCard, formats: Formats): SVGTemplateResult[] {
    const inside = frame.left === 8;
    return valueTicks(frame.low, frame.high, mostTicks).map((value) => svg`<text class=${inside ? 'tick inside' : 'tick'} x=${inside ? frame.left + 2 : frame.left - 8} y=${frame.yOf(value) + (inside ? -4 : 4)} text-anchor=${inside ? 'start' : 'end'}>${written(formats.figure(card, value))}</text>`);
  }

  /** Names at the right end of their lines, kept apart; one that would stand outside the panel is put at its edge. */
  #names(frame: HistoryFrame, named: readonly (readonly [string, number | undefined])[]): SVGTemplateResult[] {
    const placed = named
      .flatMap(([name, value]) => (value === undefined ? [] : [{ name, y: Math.min(frame.bottom, Math.max(frame.top, frame.yOf(value))) }]))
      .sort((a, b) => a.y - b.y);
    let free = Number.NEGATIVE_INFINITY;
    return placed.map(({ name, y }) => {
      const at = Math.max(y, free + 15);
      free = at;
      return svg`<text class=${name === 'bound' ? 'name strong' : 'name'} x=${frame.right + 7} y=${at + 4}>${name}</text>`;
    });
  }

  /** Nonconforming units: each of the present window as a stroke at its time; older ones as bars of their step. */
  #strip(frame: HistoryFrame, card: GuaranteeCard, history: History): SVGTemplateResult | typeof nothing {
    if (card.scale.kind === 'measure') return nothing; // Of a mean nothing is counted.
    const top = frame.bottom + 14;
    const base = top + stripHeight;
    const most = Math.max(4, ...history.nonconforming);
    const ticks = this.strip?.nonconforming.flatMap(({ at }) => (at !== undefined && at >= history.from && at <= history.to ? [at] : [])) ?? [];
    return svg`<g class="strip">
      ${history.nonconforming.map((count, index) => {
        const x = frame.xOf(history.at[index] ?? 0);
        const wide = Math.max(1.5, frame.xOf((history.at[index] ?? 0) + history.stepMs) - x - 1);
        return count === 0 ? nothing : svg`<rect class="bar" x=${x} width=${wide} y=${base - (count / most) * (stripHeight - 12)} height=${(count / most) * (stripHeight - 12)}></rect>`;
      })}
      ${ticks.map((at) => svg`<line class="stroke" x1=${frame.xOf(at)} x2=${frame.xOf(at)} y1=${top} y2=${top + 9}></line>`)}
      <line class="axis" x1=${frame.left} x2=${frame.right} y1=${base} y2=${base}></line>
      ${frame.left === 8 ? nothing : svg`<text class="tick" x=${frame.left - 8} y=${base - 12} text-anchor="end">noncon-</text><text class="tick" x=${frame.left - 8} y=${base} text-anchor="end">${card.scale.kind === 'rate' ? 'formities' : 'forming'}</text>`}
    </g>`;
  }

  #events(frame: HistoryFrame, history: History, formats: Formats): SVGTemplateResult {
    const y = frame.bottom + 14 + stripHeight + 5;
    let free = Number.NEGATIVE_INFINITY;
    return svg`${history.events.map((happening) => {
      const event = historyEvent(happening, formats);
      const x = frame.xOf(event.at);
      const room = x - free >= 17;
      if (room) free = x;
      return svg`<g class=${event.loud ? 'event loud' : 'event'}><line x1=${x} x2=${x} y1=${event.loud ? frame.top : frame.bottom} y2=${y}></line>
        ${room ? svg`<rect x=${x - 8} y=${y} width="16" height="16" rx="3"></rect><text x=${x} y=${y + 12} text-anchor="middle">${event.letter}</text>` : nothing}</g>`;
    })}`;
  }

  #point(event: PointerEvent, frame: HistoryFrame, history: History): void {
    const x = event.clientX - this.getBoundingClientRect().left;
    const step = Math.round((frame.timeOf(x) - (history.at[0] ?? 0)) / Math.max(1, history.stepMs));
    this.chosen = Math.min(history.at.length - 1, Math.max(0, step));
  }

  readonly #onKey = (event: KeyboardEvent): void => {
    const last = (this.history?.at.length ?? 1) - 1;
    const now = this.chosen ?? last;
    const to = { ArrowLeft: now - 1, ArrowRight: now + 1, PageUp: now - 10, PageDown: now + 10, Home: 0, End: last }[event.key];
    if (to === undefined) return;
    event.preventDefault();
    this.chosen = Math.min(last, Math.max(0, to));
  };
}

customElements.define('history-chart', HistoryChart);
