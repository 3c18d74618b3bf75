import { html, nothing, type TemplateResult } from 'lit';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import { written, type Formats } from '../format.ts';
import { windowWords } from '../words.ts';

const names: Readonly<Record<string, string>> = {
  inspected: 'Inspected', nonconforming: 'Nonconforming', exposure: 'Exposure', count: 'Nonconformities', mean: 'Mean',
  sd: 'Standard deviation', filled: 'Window filled', lotSize: 'Units in the lot', events: 'Events', lots: 'Lots that ended', lotsOver: 'Lots with too many',
  windowLots: 'Lots of the window', inspectedOfLot: 'Inspected of this lot', nonconformingOfLot: 'Nonconforming in this lot', runUnits: 'Units of the run', runNonconforming: 'Nonconforming in the run', runExposure: 'Exposure of the run',
  runCount: 'Nonconformities in the run', runRecords: 'Records of the run', runValues: 'Values of the run', runMean: 'Mean of the run', critical: 'Most it can take',
};

/** Figures of single stations have a table of their own. */
const ofStations = /^(inspected at |nonconforming at |limitingStation$)/;

const readable = (name: string): string => {
  const words = name.replace(/([A-Z])/g, ' $1').replace(/[-_]/g, ' ').toLowerCase();
  return words.charAt(0).toUpperCase() + words.slice(1);
};

const row = (name: string, value: string | TemplateResult): TemplateResult => html`<div><dt>${name}</dt><dd>${value}</dd></div>`;

/** The present window in figures: what was promised, what is known, from how much. */
export function windowFigures(formats: Formats, card: GuaranteeCard, view: GuaranteeView, plantNow: number): TemplateResult {
  const figure = (value: number | undefined): string => written(formats.figureBesideLine(card, value));
  const inUnit = (name: string, value: number): string => {
    if (name === 'filled') return formats.percent(value);
    if (card.scale.kind === 'measure' && (name === 'mean' || name === 'sd')) return `${formats.plain(value)} ${card.scale.unit}`;
    if (card.scale.kind === 'rate' && name === 'exposure') return `${formats.plain(value)} ${card.scale.unit}`;
    return Number.isInteger(value) ? formats.count(value) : formats.plain(value);
  };
  return html`<dl class="figures">
    ${row(card.side === 'at-most' ? 'Upper bound' : 'Lower bound', html`<b>${figure(view.bound)}</b>`)}
    ${row('Guarantee line', written(formats.figure(card, card.guaranteeLine)))}
    ${row('Estimate', figure(view.estimate))}
    ${view.oppositeBound === undefined ? nothing : row(view.oppositeLookRule === view.lookRule ? 'Opposite bound' : `Opposite bound, ${view.oppositeLookRule}`, figure(view.oppositeBound))}
    ${row('Target', written(formats.figure(card, card.target)))}
    ${view.allowance.bound === undefined ? nothing : row('Allowance used', formats.percent(view.allowance.bound))}
    ${row('Confidence level', formats.confidence(card.confidence))}
    ${row('Look rule', view.lookRule)}
    ${row('Window', windowWords(formats, card.window, card))}
    ${Object.entries(view.figures).filter(([name]) => !ofStations.test(name)).map(([name, value]) => row(names[name] ?? readable(name), inUnit(name, value)))}
    ${view.product === undefined ? nothing : row('Product now', view.product)}
    ${view.lot === undefined ? nothing : row('Lot now', view.lot)}
    ${view.lineRunning === undefined ? nothing : row('Line', view.lineRunning ? 'running' : 'stopped')}
    ${row('In this state', formats.span(plantNow - view.since))}
    ${row('Newest record', view.newest === undefined ? 'none yet' : `${formats.span(plantNow - view.newest)} ago`)}
  </dl>`;
}
