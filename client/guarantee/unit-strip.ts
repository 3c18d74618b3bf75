import { css, html, LitElement, nothing, svg, type TemplateResult } from 'lit';
import type { Strip } from '../../core/view/history.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { ElementWidth } from '../parts/element-width.ts';
import { counted } from '../words.ts';

/** The units of the present window from oldest to newest, every nonconforming one a stroke in its place. */
export class UnitStrip extends LitElement {
  static override properties = { strip: { attribute: false }, formats: { attribute: false } };

  static override styles = [base, css`
    svg { display: block; }
    .band { fill: var(--ink); opacity: 0.06; }
    .full { fill: none; stroke: var(--edge); stroke-dasharray: 3 3; }
    line { stroke: var(--ink); }
    .ends { display: flex; justify-content: space-between; font-size: 0.86rem; color: var(--quiet); gap: 1rem; }
  `];

  declare strip: Strip | undefined;
  declare formats: Formats | undefined;
  readonly #width = new ElementWidth(this);

  protected override render(): TemplateResult | typeof nothing {
    const { strip, formats } = this;
    const width = this.#width.px;
    if (strip === undefined || formats === undefined || width === 0) return nothing;
    const whole = Math.max(1, strip.full ?? 0, strip.units);
    const xOf = (place: number): number => 0.5 + (place / whole) * (width - 1);
    const listed = counted(formats, strip.nonconforming.length, 'nonconforming unit');
    return html`<svg width=${width} height="34" role="img" aria-label="${listed} among ${counted(formats, strip.units, 'unit')} of the window">
        <rect class="full" x="0.5" y="3.5" width=${width - 1} height="27"></rect>
        <rect class="band" x="0.5" y="3.5" width=${Math.max(0, xOf(strip.units) - 0.5)} height="27"></rect>
        ${strip.nonconforming.map(({ place }) => svg`<line x1=${xOf(place + 0.5)} x2=${xOf(place + 0.5)} y1="0" y2="34" stroke-width=${Math.min(4, Math.max(1.2, width / whole))}></line>`)}
      </svg>
      <p class="ends"><span>oldest</span><span>${listed} listed${strip.left > 0 ? `, ${formats.count(strip.left)} older ones not` : ''}</span><span>newest</span></p>`;
  }
}

customElements.define('unit-strip', UnitStrip);
