import { html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import type { Actor } from '../access/actor.ts';
import { roleMissing } from '../access/role-words.ts';
import { caution } from '../../core/guarantee/caution.ts';
import { isWaiting } from '../attention.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { priorityMark } from '../parts/priority-mark.ts';
import { guaranteePath } from '../route.ts';
import { alarmStateWord, priorityWord, ruleWord } from '../words.ts';
import { AcknowledgeRequest } from './acknowledge-request.ts';
import { alarmCardStyle } from './alarm-card-style.ts';

/** One alarm: what and where, since when, what to do, who has it. */
export class AlarmCard extends LitElement {
  static override properties = {
    alarm: { attribute: false },
    card: { attribute: false },
    formats: { attribute: false },
    plantNow: { attribute: false },
    actor: { attribute: false },
    kind: { reflect: true },
    priority: { reflect: true },
    brief: { type: Boolean, reflect: true },
  };

  static override styles = [base, alarmCardStyle];

  declare alarm: Alarm | undefined;
  declare card: GuaranteeCard | undefined;
  declare formats: Formats | undefined;
  declare plantNow: number;
  declare actor: Actor | undefined;
  declare kind: string;
  declare priority: string;
  /** On the guarantee's own page: without its name. */
  declare brief: boolean;

  protected override willUpdate(): void {
    this.kind = this.alarm?.state.kind ?? 'ended';
    this.priority = this.alarm?.priority ?? 'low';
  }

  protected override render(): TemplateResult | typeof nothing {
    const { alarm, formats } = this;
    if (alarm === undefined || formats === undefined) return nothing;
    const name = this.card?.name ?? alarm.guarantee;
    return html`<article>
      <p class="kind"><svg viewBox="0 0 16 16" aria-hidden="true">${priorityMark(alarm.priority)}</svg>${priorityWord[alarm.priority]}<span class="state">${alarmStateWord[alarm.state.kind]}</span></p>
      <h3>${this.brief ? ruleWord[alarm.rule] : html`<a href=${guaranteePath(alarm.guarantee)}>${name}</a>`}</h3>
      ${this.brief ? nothing : html`<p class="what">${ruleWord[alarm.rule]}${this.card === undefined ? '' : `, ${this.card.lineName}`}</p>`}
      <p class="grounds">${alarm.grounds.sentence}</p>
      ${alarm.response === '' || alarm.state.kind === 'ended' ? nothing : html`<p class="response"><b>What to do</b>${alarm.response}</p>`}
      <p class="times quiet">${this.#times(alarm, formats)}</p>
      ${isWaiting(alarm) ? this.#actions(alarm, name, this.actor) : nothing}
      ${alarm.safetyRelevant && alarm.state.kind !== 'ended' ? html`<p class="caution"><b>${caution.title}.</b> ${caution.sentences.join(' ')}</p>` : nothing}
    </article>`;
  }

  #times(alarm: Alarm, formats: Formats): string {
    const { state } = alarm;
    const raised = `Raised ${formats.moment(alarm.raisedAt)}`;
    const again = alarm.times > 1 ? `, came back ${formats.count(alarm.times - 1)} ${alarm.times === 2 ? 'time' : 'times'}` : '';
    const since = state.kind === 'raised' || state.kind === 'acknowledged' ? `, ${formats.span(this.plantNow - alarm.raisedAt)} ago` : '';
    const back = 'returnedAt' in state ? `. Back to normal ${formats.moment(state.returnedAt)}` : '';
    const by = 'acknowledgement' in state
      ? `. Acknowledged by ${state.acknowledgement.by}, ${formats.minute(state.acknowledgement.at)}${state.acknowledgement.note === '' ? '' : `: “${state.acknowledgement.note}”`}`
      : '';
    return `${raised}${since}${again}${back}${by}`;
  }

  #actions(alarm: Alarm, name: string, actor: Actor | undefined): TemplateResult {
    if (actor?.may('acknowledge', this.card?.line) !== true) return html`<p class="quiet may-not">${roleMissing('Acknowledging', 'acknowledge', this.card?.lineName ?? 'its line')}</p>`;
    const known = actor.name !== '';
    const label = known ? `Acknowledge as ${actor.name}` : 'Acknowledge';
    const more = actor.named === 'typed' ? 'With a note or another name' : 'With a note';
    return html`<div class="does">
      <button class="first" aria-label="${label}: ${name}, ${ruleWord[alarm.rule]}" @click=${() => this.dispatchEvent(new AcknowledgeRequest(alarm))}>${label}</button>
      ${known ? html`<button @click=${() => this.dispatchEvent(new AcknowledgeRequest(alarm, true))} aria-label="${more}: ${name}">${more}</button>` : nothing}
    </div>`;
  }
}

customElements.define('alarm-card', AlarmCard);
