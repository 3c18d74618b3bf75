import { html, nothing, type TemplateResult } from 'lit';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import type { Formats } from '../format.ts';
import { counted, detectorWords } from '../words.ts';

/** How far the change detector has gone on the way to its alarm, and what that means; nothing where none is set. */
export function changeGauge(formats: Formats, card: GuaranteeCard, view: GuaranteeView): TemplateResult | typeof nothing {
  const { detector } = view;
  if (detector === undefined) return nothing;
  const share = formats.percent(detector.gauge);
  const between = card.scale.kind === 'rate' ? `${formats.count(detector.betweenFalseCalls)} ${card.scale.unit}` : counted(formats, detector.betweenFalseCalls, 'unit');
  return html`<section class="sheet part change-part"><h2>Change detector</h2>
    <svg class="gauge" viewBox="0 0 100 10" preserveAspectRatio="none" role="img" aria-label="${share} of the way to its alarm"><rect width=${100 * detector.gauge} height="10"></rect><line x1="50" x2="50" y1="0" y2="10"></line></svg>
    <p class="ends quiet"><span>at rest</span><span>half way</span><span>alarm</span></p>
    <p>${share} of the way to its alarm. ${detectorWords(formats, detector)}</p>
    <details><summary>What does this mean?</summary>
      <p>The gauge fills with every nonconforming unit and empties while units conform; when it is full, the rate has risen. A well line calls falsely at most once in ${between} on average, however often anybody looks.</p>
    </details></section>`;
}
