import { html, LitElement, nothing, svg, type SVGTemplateResult, type TemplateResult } from 'lit';
import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import type { RunPaths, RunView } from '../../core/view/run-view.ts';
import { written, type Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { ElementWidth } from '../parts/element-width.ts';
import { runBeginning } from '../words.ts';
import { timeTicks, zoneOffset } from './axis-ticks.ts';
import { evidencePath, evidenceScale, type EvidenceScale } from './evidence-scale.ts';
import { oddsWords, powerLabel } from './odds-words.ts';
import { runEvidenceStyle } from './run-evidence-style.ts';

const height = 210;
const top = 12;
const bottom = height - 26;

/** The evidence of the run on a logarithmic scale, for and against the guarantee, with what is enough for either. */
export class RunEvidencePart extends LitElement {
  static override properties = {
    card: { attribute: false },
    run: { attribute: false },
    paths: { attribute: false },
    formats: { attribute: false },
    timeZone: { attribute: false },
    plantNow: { attribute: false },
  };

  static override styles = [base, runEvidenceStyle];

  declare card: GuaranteeCard | undefined;
  declare run: RunView | undefined;
  declare paths: RunPaths | undefined;
  declare formats: Formats | undefined;
  declare timeZone: string;
  declare plantNow: number;

  readonly #width = new ElementWidth(this);

  protected override render(): TemplateResult | typeof nothing {
    const { card, run, formats } = this;
    if (card === undefined || run === undefined || formats === undefined) return nothing;
    return html`
      <h2>Evidence of the run</h2>
      <p class="quiet">${runBeginning(formats, run)} ${decides[run.decides]}</p>
      ${this.#chart(run, formats)}
      <dl>
        <div><dt><i class="kept"></i>That it is kept</dt><dd>${oddsWords(formats, run.kept)}<span class="quiet">enough: ${oddsWords(formats, run.enoughKept)}</span></dd></div>
        <div><dt><i class="broken"></i>That it is broken</dt><dd>${oddsWords(formats, run.broken)}<span class="quiet">enough: ${oddsWords(formats, run.enoughBroken)}</span></dd></div>
        <div><dt>${card.side === 'at-most' ? 'Upper' : 'Lower'} bound, all looks</dt><dd>${written(formats.figureBesideLine(card, run.bound))}</dd></div>
        <div><dt>Opposite bound, all looks</dt><dd>${written(formats.figureBesideLine(card, run.opposite))}</dd></div>
        ${run.brokenAt === undefined ? nothing : html`<div><dt>First said broken</dt><dd>${formats.moment(run.brokenAt)}</dd></div>`}
        ${run.keptAt === undefined ? nothing : html`<div><dt>First said kept</dt><dd>${formats.moment(run.keptAt)}</dd></div>`}
      </dl>
      <details><summary>What does this mean?</summary>
        <p>Evidence of ${oddsWords(formats, run.enoughKept)} for the guarantee would come up by chance at most once in ${formats.plain(Number((10 ** run.enoughKept).toPrecision(3)))} runs of a line that does not keep it, however often anybody looks. It has counted every record since the run began, so an old good time still speaks in it; only a declared event begins it anew.</p>
        <p class="quiet"><b>${run.method.name}.</b> ${run.method.sentence} ${run.method.assumes.join(' ')} Source: ${run.method.source}.</p>
      </details>`;
  }

  #chart(run: RunView, formats: Formats): TemplateResult {
    const { paths } = this;
    const width = this.#width.px;
    if (width === 0) return html`<div class="room"></div>`;
    if (run.begunAt === undefined) return html`<p class="none quiet">No record has come in this run yet.</p>`;
    const scale = evidenceScale(run, top, bottom);
    const left = width < 480 ? 34 : 46;
    const right = width - 8;
    const to = Math.max(this.plantNow, run.begunAt + 60_000);
    const from = run.begunAt;
    const xOf = (at: number): number => left + ((at - from) / (to - from)) * (right - left);
    const now = run.kept === undefined || run.broken === undefined ? undefined : { at: to, kept: run.kept, broken: run.broken };
    const at = [from, ...(paths?.run.at ?? []), ...(now ? [now.at] : [])];
    const line = (name: 'kept' | 'broken'): string => evidencePath(at, [0, ...(paths?.run[name] ?? []), ...(now ? [now[name]] : [])], xOf, scale.yOf);
    const enough = run.enoughKept === run.enoughBroken
      ? [{ y: scale.yOf(run.enoughKept), words: 'enough to say either' }]
      : [{ y: scale.yOf(run.enoughKept), words: 'enough to say kept' }, { y: scale.yOf(run.enoughBroken), words: 'enough to say broken' }];
    const words = `Evidence that the guarantee is kept: ${oddsWords(formats, run.kept)}; that it is broken: ${oddsWords(formats, run.broken)}`;
    return html`<svg class="chart" width=${width} height=${height} role="img" aria-label=${words}>
      ${this.#ground(scale, { left, right, from, to, xOf }, formats)}
      ${enough.map(({ y }) => svg`<line class="enough" x1=${left} x2=${right} y1=${y} y2=${y}></line>`)}
      <path class="kept" d=${line('kept')}></path><path class="broken" d=${line('broken')}></path>
      ${now ? svg`<circle class="kept" cx=${xOf(to)} cy=${scale.yOf(now.kept)} r="4"></circle><rect class="broken" x=${xOf(to) - 4} y=${scale.yOf(now.broken) - 4} width="8" height="8"></rect>` : nothing}
      ${enough.map(({ y, words: said }) => svg`<text class="label" x=${left + 6} y=${y - 5}>${said}</text>`)}
    </svg>`;
  }

  #ground(scale: EvidenceScale, axis: { left: number; right: number; from: number; to: number; xOf: (at: number) => number }, formats: Formats): SVGTemplateResult {
    const { left, right, from, to, xOf } = axis;
    const times = timeTicks(from, to, Math.max(2, Math.floor((right - left) / 100)), zoneOffset(this.timeZone, to));
    const longSpan = to - from > 36 * 3_600_000;
    return svg`${scale.ticks.map((power) => svg`<line class="grid" x1=${left} x2=${right} y1=${scale.yOf(power)} y2=${scale.yOf(power)}></line>
        <text class="tick" x=${left - 6} y=${scale.yOf(power) + 4} text-anchor="end">${powerLabel(power)}</text>`)}
      ${times.map((at) => svg`<text class="tick" x=${xOf(at)} y=${height - 8} text-anchor="middle">${longSpan ? formats.day(at) : formats.minute(at)}</text>`)}`;
  }
}

const decides = {
  state: 'It decides the state.',
  violation: 'It decides whether the guarantee is violated; the window decides what is demonstrated.',
  nothing: 'It stands beside the window, which decides.',
} as const;

customElements.define('run-evidence', RunEvidencePart);
