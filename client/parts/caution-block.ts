import { css, html, LitElement, type TemplateResult } from 'lit';
import { caution } from '../../core/guarantee/caution.ts';
import { base } from '../look/base.ts';

/** The caution that stands beside everything safety-relevant, always in the same words. */
export class CautionBlock extends LitElement {
  static override styles = [base, css`
    aside { border: 1.5px solid var(--ink); border-radius: 6px; padding: 0.6rem 0.9rem 0.7rem; display: grid; grid-template-columns: auto 1fr; gap: 0 0.7rem; background: var(--sheet); }
    svg { width: 1.5rem; height: 1.5rem; margin-top: 0.05rem; }
    h2 { font-size: 1rem; line-height: 1.5; }
    p { grid-column: 2; max-width: 85ch; font-size: 0.93rem; text-wrap: pretty; }
  `];

  protected override render(): TemplateResult {
    return html`<aside aria-label=${caution.title}>
      <svg viewBox="0 0 24 24" aria-hidden="true"><path d="M12 2.5L22.5 21h-21z" fill="none" stroke="currentColor" stroke-width="2" stroke-linejoin="round"/><path d="M12 9.5v5.5M12 17.4v1" stroke="currentColor" stroke-width="2.2" stroke-linecap="round"/></svg>
      <h2>${caution.title}</h2>
      <p>${caution.sentences.join(' ')}</p>
    </aside>`;
  }
}

customElements.define('caution-block', CautionBlock);
