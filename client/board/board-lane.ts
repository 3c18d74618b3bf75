import { html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import { isWaiting } from '../attention.ts';
import type { Formats } from '../format.ts';
import { laneSentence } from '../lane-sentence.ts';
import { base } from '../look/base.ts';
import { stateMark } from '../parts/state-mark.ts';
import { AcknowledgeRequest } from '../alarms/acknowledge-request.ts';
import { guaranteePath } from '../route.ts';
import { marginBrief, marginWords, promisedLimit, ruleWord, saidByState, standing, stateWord } from '../words.ts';
import type { AllowanceScale } from './allowance-scale.ts';
import { boardLaneStyle } from './board-lane-style.ts';
import type { LaneSize } from './lane-heights.ts';
import type { Lane } from './lane.ts';
import { lanePlot } from './lane-plot.ts';
import { lanePlotStyle } from './lane-plot-style.ts';

/** How a lane is laid out: columns at a desk, the same with fewer and larger words on a wall, a card on a phone. */
export type LaneForm = 'desk' | 'wall' | 'card';

/** Letters of the name's size that stand beside each other in a lane one line high. */
const oneLineChars = 28;

/** One guarantee's lane: name, drawing, state, figures, what a person may do. */
export class BoardLane extends LitElement {
  static override properties = {
    lane: { attribute: false },
    scale: { attribute: false },
    height: { attribute: false },
    size: { reflect: true },
    form: { reflect: true },
    tone: { reflect: true },
    formats: { attribute: false },
    age: { attribute: false },
    mayAcknowledge: { attribute: false },
  };

  static override styles = [base, lanePlotStyle, boardLaneStyle];

  declare lane: Lane | undefined;
  declare scale: AllowanceScale | undefined;
  declare height: number;
  declare size: LaneSize;
  declare form: LaneForm;
  declare tone: Lane['tone'];
  declare formats: Formats | undefined;
  /** Age of the newest record in words; undefined before the first. */
  declare age: string | undefined;
  declare mayAcknowledge: boolean;

  protected override render(): TemplateResult | typeof nothing {
    const { lane, scale, formats } = this;
    if (lane === undefined || scale === undefined || formats === undefined) return nothing;
    return html`<article part="lane">
      ${this.#who(lane, formats)}
      <div class="plot">
        <svg class="drawing" width=${scale.width} height=${this.height} aria-hidden="true">${lanePlot({ scale, height: this.height, view: lane.view, tone: lane.tone })}</svg>
      </div>
      ${this.#state(lane, formats)} ${this.#figure(lane, formats)} ${this.form === 'wall' ? nothing : this.#act(lane)}
    </article>`;
  }

  #who({ card, view, alarms }: Lane, formats: Formats): TemplateResult {
    return html`<div class="who">
      <a href=${guaranteePath(card.id)} aria-label=${this.lane === undefined ? card.name : laneSentence(formats, this.lane, this.age)}>${card.name}</a>
      <span class="sub place">${this.#place(card)}${this.form === 'wall' ? this.#inHand(alarms) : ''}</span>
      ${card.safetyRelevant ? html`<span class="sub safety">${this.size === 'large' ? 'Safety-relevant: advisory only' : 'Safety-relevant'}</span>` : nothing}
      ${view.lot === undefined || this.size !== 'large' || card.safetyRelevant ? nothing : html`<span class="sub">Lot ${view.lot}</span>`}
    </div>`;
  }

  /** On a wall, where there is no button: who has the alarm in hand. */
  #inHand(alarms: readonly Alarm[]): string {
    const state = alarms[0]?.state;
    return state?.kind === 'acknowledged' && this.size !== 'small' ? `, in hand: ${state.acknowledgement.by}` : '';
  }

  /** Line and stations, as far as the lane has room to say. */
  #place({ name, lineName, stationNames, safetyRelevant }: GuaranteeCard): string {
    const beside = name.length + 0.8 * (lineName.length + (safetyRelevant ? 17 : 0));
    if (this.form !== 'card' && this.size === 'small' && beside > oneLineChars) return '';
    const spare = this.form !== 'wall' && (this.size === 'large' || (this.size === 'medium' && !safetyRelevant && stationNames.length === 1));
    return spare && stationNames.length > 0 ? `${lineName}, ${stationNames.join(' to ')}` : lineName;
  }

  #state({ card, view, alarms }: Lane, formats: Formats): TemplateResult {
    const alarm = alarms[0];
    return html`<div class="state">
      <b class="word"><svg class="mark" viewBox="0 0 16 16" aria-hidden="true">${stateMark(view.state)}</svg>${stateWord[view.state]}</b>
      <span class="sub standing">${this.#standing(card, view, formats)}</span>
      ${alarm === undefined || saidByState(view.state, alarm.rule) ? nothing : html`<span class="sub alarm">Alarm: ${ruleWord[alarm.rule].toLowerCase()}</span>`}
    </div>`;
  }

  #standing(card: GuaranteeCard, view: GuaranteeView, formats: Formats): string | undefined {
    if (this.size === 'small') return marginBrief(formats, view);
    return this.form === 'wall' && view.state !== 'unknown' ? marginWords(formats, card, view) : standing(formats, card, view);
  }

  #figure({ card, view }: Lane, formats: Formats): TemplateResult {
    const filled = view.state === 'gathering' ? view.figures['filled'] : undefined;
    const figure = formats.figureBesideLine(card, view.bound);
    return html`<div class="figure">
      ${filled !== undefined
        ? html`<b>${formats.percent(filled)}<span class="unit">filled</span></b><span class="sub">of the window</span>`
        : html`<b>${figure.text}<span class="unit">${figure.unit}</span></b><span class="sub">${promisedLimit(formats, card)}</span>`}
      <span class="sub level">${formats.confidence(card.confidence)}, ${view.lookRule}</span>
    </div>`;
  }

  #act({ alarms }: Lane): TemplateResult {
    const waiting = alarms.find(isWaiting);
    const known = alarms.find((alarm) => alarm.state.kind === 'acknowledged');
    return html`<div class="act">
      ${waiting === undefined ? nothing : this.#acknowledge(waiting)}
      ${waiting === undefined && known?.state.kind === 'acknowledged'
        ? html`<span class="sub known">Acknowledged<br />by ${known.state.acknowledgement.by}</span>`
        : nothing}
      <span class="sub age">${this.age === undefined ? 'no record yet' : `${this.age} ago`}</span>
    </div>`;
  }

  #acknowledge(alarm: Alarm): TemplateResult {
    if (!this.mayAcknowledge) return html`<span class="sub known">Not yet acknowledged</span>`;
    return html`<button @click=${() => this.dispatchEvent(new AcknowledgeRequest(alarm))} aria-label="Acknowledge: ${this.lane?.card.name ?? ''}, ${ruleWord[alarm.rule]}">Acknowledge</button>`;
  }
}

customElements.define('board-lane', BoardLane);
