import { html, nothing, type TemplateResult } from 'lit';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import type { Formats } from '../format.ts';
import { lookMeaning, promiseWords, windowWords } from '../words.ts';

/** Method, look rule, assumptions and source: enough to check the figure by hand or to doubt it for a reason. */
export function howComputed(formats: Formats, card: GuaranteeCard, view: GuaranteeView): TemplateResult {
  return html`<section class="how">
    <h2>How this is computed</h2>
    <p>Promised: ${promiseWords(formats, card)}. A one-sided ${formats.confidence(card.confidence)} bound is computed from ${card.looks === 'all looks' ? 'every record since the run began' : windowWords(formats, card.window, card)} and compared with the guarantee line.${card.looks === 'both' ? ' Whether the guarantee is violated, the evidence of the whole run says.' : ''}</p>
    <dl>
      <div><dt>Method</dt><dd><b>${card.method.name}.</b> ${card.method.sentence}</dd></div>
      <div><dt>Look rule</dt><dd><b>${view.lookRule}.</b> ${lookMeaning[view.lookRule]}</dd></div>
      ${card.method.assumes.length === 0 ? nothing : html`<div><dt>Assumes</dt><dd><ul>${card.method.assumes.map((one) => html`<li>${one}</li>`)}</ul></dd></div>`}
      <div><dt>Source</dt><dd>${card.method.source}</dd></div>
    </dl>
  </section>`;
}
