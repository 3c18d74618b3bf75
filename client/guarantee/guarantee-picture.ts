import { css, html, LitElement, nothing, svg, type SVGTemplateResult, type TemplateResult } from 'lit';
import type { Picture } from '../../core/view/history.ts';
import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import { written, type Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { ElementWidth } from '../parts/element-width.ts';
import { counted } from '../words.ts';
import { timeTicks, valueTicks, zoneOffset } from './axis-ticks.ts';
import { normalCurve } from './normal-curve.ts';

type Distribution = Extract<Picture, { kind: 'distribution' }>;
type Stations = Extract<Picture, { kind: 'stations' }>;
type Steps = Extract<Picture, { kind: 'steps' }>;

/** What suits the kind of guarantee: the values with their limit and model, the stations side by side, or a window of time part by part. */
export class GuaranteePicture extends LitElement {
  static override properties = { picture: { attribute: false }, card: { attribute: false }, formats: { attribute: false }, timeZone: { attribute: false } };

  static override styles = [base, css`
    h2 { font-size: 1.05rem; margin-bottom: 0.4rem; }
    svg { display: block; }
    text { font-family: var(--face); font-size: 12.5px; fill: var(--quiet); }
    .bin { fill: var(--calm); opacity: 0.5; }
    .bin.ground { opacity: 0.25; }
    .bin.out { fill: var(--harm-mark); opacity: 0.9; }
    .model { fill: none; stroke: var(--ink); stroke-width: 1.8; }
    .tail { fill: var(--harm-mark); opacity: 0.25; }
    .limit { stroke: var(--ink); stroke-width: 2.2; }
    .axis { stroke: var(--edge); }
    .strong { fill: var(--ink); font-weight: 650; }
    table { border-collapse: collapse; width: 100%; }
    th, td { text-align: right; padding: 0.35rem 0.5rem; border-top: 1px solid var(--rule); font-weight: 400; }
    thead th { border: 0; color: var(--quiet); font-size: 0.86rem; white-space: nowrap; }
    tbody th, thead th:first-child { text-align: left; font-weight: 600; padding-left: 0; }
    td.yield { font-weight: 700; }
    td.bar { width: 30%; min-width: 5rem; }
    .limiting th, .limiting .yield { color: var(--care); }
    .said { font-size: 0.93rem; margin-top: 0.4rem; max-width: 75ch; }
    @media (max-width: 760px) { td.bar, th.bar { display: none; } }
  `];

  declare picture: Picture | undefined;
  declare card: GuaranteeCard | undefined;
  declare formats: Formats | undefined;
  declare timeZone: string | undefined;
  readonly #width = new ElementWidth(this);

  protected override render(): TemplateResult | typeof nothing {
    const { picture, formats, card } = this;
    if (picture === undefined || formats === undefined || card === undefined) return nothing;
    switch (picture.kind) {
      case 'none':
        return nothing;
      case 'distribution':
        return html`<h2>Values of the window</h2>${this.#distribution(picture, formats)}`;
      case 'steps':
        return html`<h2>The window by time</h2>${this.#steps(picture, formats)}`;
      case 'stations':
        return html`<h2>Station by station</h2>${this.#stations(picture, formats, card)}`;
    }
  }

  #distribution(picture: Distribution, formats: Formats): TemplateResult | typeof nothing {
    const width = this.#width.px;
    const { edges, counts, limit } = picture;
    const total = counts.reduce((sum, count) => sum + count, 0);
    if (width === 0 || total === 0) return html`<p class="quiet">No values yet.</p>`;
    const values = limit === undefined ? edges : [...edges, limit.value];
    const low = Math.min(...values);
    const high = Math.max(...values);
    const pad = (high - low) * 0.04;
    const xOf = (value: number): number => 4 + ((value - low + pad) / (high - low + 2 * pad || 1)) * (width - 8);
    const most = Math.max(...counts);
    const [top, bottom] = [24, 190];
    const yOf = (count: number): number => bottom - (count / most) * (bottom - top - 6);
    const binWidth = (edges[1] ?? 1) - (edges[0] ?? 0);
    return html`<svg width=${width} height="216" role="img" aria-label=${this.#distributionWords(picture, total, formats)}>
      ${counts.map((count, index) => this.#bin([edges[index] ?? 0, edges[index + 1] ?? 0], count, picture, xOf, yOf))}
      ${picture.model.verdict === 'fits' ? this.#model(picture, total * binWidth, [low - pad, high + pad], xOf, yOf) : nothing}
      <line class="axis" x1="0" x2=${width} y1=${bottom} y2=${bottom}></line>
      ${valueTicks(low, high, Math.max(2, Math.floor(width / 90))).map((value) => svg`<text x=${xOf(value)} y=${bottom + 18} text-anchor="middle">${formats.plain(value)}</text>`)}
      ${limit === undefined ? nothing : svg`<line class="limit" x1=${xOf(limit.value)} x2=${xOf(limit.value)} y1=${top - 8} y2=${bottom}></line>
        <text class="strong" x=${xOf(limit.value) + (xOf(limit.value) > width / 2 ? -6 : 6)} y="14" text-anchor=${xOf(limit.value) > width / 2 ? 'end' : 'start'}>${limit.side === 'below' ? 'LSL' : 'USL'} ${formats.plain(limit.value)} ${picture.unit}</text>`}
    </svg><p class="said">${picture.model.sentence}</p>`;
  }

  #bin([from, to]: readonly [number, number], count: number, { limit }: Distribution, xOf: (v: number) => number, yOf: (c: number) => number): SVGTemplateResult {
    const out = limit !== undefined && (limit.side === 'below' ? to <= limit.value : from >= limit.value);
    return svg`<rect class=${out ? 'bin out' : 'bin'} x=${xOf(from) + 0.5} width=${Math.max(1, xOf(to) - xOf(from) - 1)} y=${yOf(count)} height=${yOf(0) - yOf(count)}></rect>`;
  }

  #model({ mean, sd, limit }: Distribution, area: number, span: readonly [number, number], xOf: (v: number) => number, yOf: (c: number) => number): SVGTemplateResult {
    const path = (from: number, to: number): string =>
      normalCurve(mean, sd, from, to, 80).map(([x, density], index) => `${index === 0 ? 'M' : 'L'}${xOf(x).toFixed(1)} ${yOf(density * area).toFixed(1)}`).join('');
    const tail = limit === undefined ? undefined : limit.side === 'below' ? ([span[0], limit.value] as const) : ([limit.value, span[1]] as const);
    return svg`${tail === undefined ? nothing : svg`<path class="tail" d="${path(...tail)}L${xOf(tail[1])} ${yOf(0)}L${xOf(tail[0])} ${yOf(0)}Z"></path>`}
      <path class="model" d=${path(...span)}></path>`;
  }

  #distributionWords({ mean, sd, unit }: Distribution, total: number, formats: Formats): string {
    return `${formats.count(total)} values, mean ${formats.plain(mean)} ${unit}, standard deviation ${formats.plain(sd)} ${unit}`;
  }

  /** Nonconforming units of each part as a bar; parts in which nothing was inspected are left open. */
  #steps({ from, stepMs, inspected, nonconforming }: Steps, formats: Formats): TemplateResult | typeof nothing {
    const width = this.#width.px;
    if (width === 0) return nothing;
    const to = from + stepMs * inspected.length;
    const most = Math.max(1, ...nonconforming);
    const [top, bottom] = [18, 110];
    const xOf = (at: number): number => 4 + ((at - from) / (to - from)) * (width - 8);
    const bar = (part: number, kind: string, tall: number): SVGTemplateResult =>
      svg`<rect class=${kind} x=${xOf(from + part * stepMs) + 0.5} width=${Math.max(1, xOf(from + stepMs) - xOf(from) - 1)} y=${bottom - tall} height=${tall}></rect>`;
    const total = (counts: readonly number[]): number => counts.reduce((sum, count) => sum + count, 0);
    const words = `${formats.count(total(nonconforming))} nonconforming among ${counted(formats, total(inspected), 'unit')}; at most ${formats.count(Math.max(0, ...nonconforming))} in ${formats.span(stepMs)}`;
    const longSpan = to - from > 36 * 3_600_000;
    return html`<svg width=${width} height="136" role="img" aria-label=${words}>
      ${inspected.map((units, part) => (units === 0 ? nothing : bar(part, 'bin ground', 3)))}
      ${nonconforming.map((count, part) => (count === 0 ? nothing : bar(part, 'bin', (count / most) * (bottom - top))))}
      <line class="axis" x1="0" x2=${width} y1=${bottom} y2=${bottom}></line>
      ${timeTicks(from, to, Math.max(2, Math.floor(width / 90)), zoneOffset(this.timeZone ?? 'UTC', to)).map((at) => svg`<text x=${Math.min(width - 30, Math.max(30, xOf(at)))} y=${bottom + 18} text-anchor="middle">${longSpan ? formats.day(at) : formats.minute(at)}</text>`)}
    </svg><p class="said">${words}.</p>`;
  }

  #stations({ stations }: Stations, formats: Formats, card: GuaranteeCard): TemplateResult {
    const worst = Math.max(1e-9, ...stations.map((station) => 1 - station.yield));
    return html`<table>
      <thead><tr><th scope="col">Station</th><th scope="col">Inspected</th><th scope="col">Nonconforming</th><th scope="col">Yield</th><th class="bar" scope="col">Share of what is lost</th></tr></thead>
      <tbody>${stations.map((station) => html`<tr class=${station.limiting ? 'limiting' : ''}>
        <th scope="row">${station.name}${station.limiting ? ' (limits the line)' : ''}</th>
        <td>${formats.count(station.inspected)}</td><td>${formats.count(station.nonconforming)}</td>
        <td class="yield">${written(formats.figure({ ...card, side: 'at-least', scale: { kind: 'share' } }, station.yield))}</td>
        <td class="bar"><svg width="100%" height="12" aria-hidden="true"><rect class=${station.limiting ? 'bin out' : 'bin'} width="${(100 * (1 - station.yield)) / worst}%" height="12"></rect></svg></td>
      </tr>`)}</tbody>
    </table>`;
  }
}

customElements.define('guarantee-picture', GuaranteePicture);
