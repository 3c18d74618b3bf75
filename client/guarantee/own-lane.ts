import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import { allowanceScale } from '../board/allowance-scale.ts';
import { boardScale } from '../board/board-scale.ts';
import type { Lane } from '../board/lane.ts';
import { lanePlot } from '../board/lane-plot.ts';
import { lanePlotStyle } from '../board/lane-plot-style.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { ElementWidth } from '../parts/element-width.ts';

/** The guarantee's lane as the board draws it, large, with its scale. */
export class OwnLane extends LitElement {
  static override properties = { lane: { attribute: false }, formats: { attribute: false } };

  static override styles = [base, lanePlotStyle, css`
    text { fill: var(--quiet); font-family: var(--face); }
    text.name { fill: var(--ink); font-weight: 700; }
  `];

  declare lane: Lane | undefined;
  declare formats: Formats | undefined;
  readonly #width = new ElementWidth(this);

  protected override render(): TemplateResult | typeof nothing {
    const width = this.#width.px;
    if (this.lane === undefined || this.formats === undefined || width < 40) return nothing;
    const scale = allowanceScale(width);
    return html`${boardScale(scale, this.formats, 13)}
      <svg class="drawing" width=${width} height="84" aria-hidden="true">${lanePlot({ scale, height: 84, view: this.lane.view, tone: this.lane.tone })}</svg>`;
  }
}

customElements.define('own-lane', OwnLane);
