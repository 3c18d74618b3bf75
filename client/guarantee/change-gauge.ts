import { html, nothing, svg, type TemplateResult } from 'lit';
import type { DetectorView } from '../../core/run/detector-view.ts';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import type { RunPaths } from '../../core/view/run-view.ts';
import type { Formats } from '../format.ts';
import { counted, detectorWords } from '../words.ts';

const kinds = { mixture: 'mixture change detector', cusum: 'cumulative sum' } as const;

/** How far the change detector has gone on the way to its alarm, where it stood lately, and what that means; nothing where none is set. */
export function changeGauge(formats: Formats, card: GuaranteeCard, view: GuaranteeView, paths: RunPaths | undefined): TemplateResult | typeof nothing {
  const { detector } = view;
  if (detector === undefined) return nothing;
  const share = formats.percent(detector.gauge);
  return html`<section class="sheet part change-part ${detector.alarmed ? 'alarmed' : ''}"><h2>Change detector</h2>
    <svg class="gauge" viewBox="0 0 100 10" preserveAspectRatio="none" role="img" aria-label="${share} of the way to its alarm"><rect width=${100 * detector.gauge} height="10"></rect><line x1="50" x2="50" y1="0" y2="10"></line></svg>
    <p class="ends quiet"><span>at rest</span><span>half way</span><span>alarm</span></p>
    <p>${detector.alarmed ? html`<b>Its alarm stands.</b> ${returning(formats, card, detector)}` : `${share} of the way to its alarm. ${detectorWords(formats, detector, card)}`}</p>
    ${lately(formats, detector, paths)}
    ${detector.doubt === undefined ? nothing : html`<p class="warning"><b>Mind:</b> ${detector.doubt}</p>`}
    <details><summary>What does this mean?</summary>
      <p>${meaning(formats, card, detector)}</p>
      <p class="quiet">Method: ${kinds[detector.kind]}, against the ${detector.against === 'line' ? 'guarantee line' : 'declared normal rate'}.</p>
    </details></section>`;
}

/** When a standing alarm returns. */
function returning(formats: Formats, { scale }: GuaranteeCard, { gauge, toReturn, conformingToHalfWay = 0 }: DetectorView): string {
  const halfWay = conformingToHalfWay > 0 && scale.kind === 'share' ? ` Half way back after ${formats.count(conformingToHalfWay)} of them.` : '';
  if (toReturn === undefined) return `${formats.percent(gauge)} of the way still, back at half way it returns.`;
  return scale.kind === 'rate'
    ? `It returns after ${formats.count(Math.ceil(toReturn))} ${scale.unit} more without a nonconformity.`
    : `It returns after ${formats.count(Math.ceil(toReturn))} units more if they all conform.${halfWay}`;
}

function meaning(formats: Formats, card: GuaranteeCard, { betweenFalseCalls, kind }: DetectorView): string {
  if (card.scale.kind === 'measure') return `The gauge fills with every value on the bad side and empties with every good one; when it is full, the mean has become worse. A well line calls falsely at most once in ${counted(formats, betweenFalseCalls, 'value')} on average, however often anybody looks.`;
  const between = card.scale.kind === 'rate' ? `${formats.count(betweenFalseCalls)} ${card.scale.unit}` : counted(formats, betweenFalseCalls, 'unit');
  return `The gauge fills with every ${card.scale.kind === 'rate' ? 'nonconformity and empties where there is none' : 'nonconforming unit and empties while units conform'}; when it is full, the rate has risen. A well line calls falsely ${kind === 'cusum' ? 'about' : 'at most'} once in ${between} on average, however often anybody looks.`;
}

/** The gauge of the last hours as a line from rest to alarm; nothing before two marks. */
function lately(formats: Formats, { gauge }: DetectorView, paths: RunPaths | undefined): TemplateResult | typeof nothing {
  const { at = [], gauge: stood = [] } = paths?.gauge ?? {};
  const [first] = at;
  const last = at.at(-1);
  if (first === undefined || last === undefined || at.length < 2) return nothing;
  const xOf = (moment: number): number => (100 * (moment - first)) / (last - first);
  const path = at.map((moment, place) => `${place === 0 ? 'M' : 'L'}${xOf(moment).toFixed(2)} ${(30 - 30 * (stood[place] ?? 0)).toFixed(2)}`).join('');
  const highest = Math.max(gauge, ...stood);
  return html`<svg class="lately" viewBox="0 0 100 30" preserveAspectRatio="none" role="img" aria-label="The gauge lately: at most ${formats.percent(highest)} of the way">
      ${svg`<line x1="0" x2="100" y1="15" y2="15"></line><path d=${path}></path>`}</svg>
    <p class="ends quiet"><span>${formats.minute(first)}</span><span>${formats.minute(last)}</span></p>`;
}
