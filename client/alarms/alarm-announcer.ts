import { css, html, LitElement, nothing, type PropertyValues, type TemplateResult } from 'lit';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { Actor } from '../access/actor.ts';
import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import { byUrgency } from '../attention.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { priorityMark } from '../parts/priority-mark.ts';
import { guaranteePath } from '../route.ts';
import { priorityWord, ruleWord } from '../words.ts';
import { AcknowledgeRequest } from './acknowledge-request.ts';

/**
 * Tells of alarms raised while the page is open: politely to those who hear the page, and as a slip at its lower end
 * that stays until it is acknowledged or put aside.
 */
export class AlarmAnnouncer extends LitElement {
  static override properties = {
    alarms: { attribute: false },
    cards: { attribute: false },
    formats: { attribute: false },
    shown: { attribute: false },
    actor: { attribute: false },
  };

  static override styles = [base, css`
    .slip {
      position: fixed; right: 1.2rem; bottom: 1.2rem; z-index: 6; width: min(27rem, calc(100vw - 1.2rem)); background: var(--raised);
      border: 2px solid var(--care-mark); border-radius: 8px; padding: 0.75rem 1rem 0.85rem; box-shadow: 0 8px 28px rgb(0 0 0 / 0.22);
      display: grid; gap: 0.2rem;
    }
    .slip.high { border-color: var(--harm-mark); }
    .kind { display: flex; gap: 0.5em; align-items: center; font-weight: 700; color: var(--care); }
    .high .kind { color: var(--harm); }
    svg { width: 1em; height: 1em; }
    .does { display: flex; gap: 0.5rem; margin-top: 0.4rem; }
    @media (max-width: 760px) { .slip { right: 0.6rem; bottom: 0.6rem; } .does button { flex: 1; min-height: 3.2rem; } }
  `];

  declare alarms: ReadonlyMap<number, Alarm> | undefined;
  declare cards: readonly GuaranteeCard[] | undefined;
  declare formats: Formats | undefined;
  declare shown: boolean;
  declare actor: Actor | undefined;

  /** The highest id there was when the page came: what was raised before is on the board, not news. */
  #seen: number | undefined;
  #aside = new Set<number>();
  #news = '';

  protected override willUpdate(changed: PropertyValues): void {
    if (!changed.has('alarms') || this.alarms === undefined) return;
    const newest = Math.max(0, ...this.alarms.keys());
    if (this.#seen === undefined) {
      this.#seen = newest;
      this.#aside = new Set(this.alarms.keys());
      return;
    }
    const since = this.#seen;
    const raised = [...this.alarms.values()].filter((alarm) => alarm.id > since);
    if (raised.length > 0) this.#news = raised.map((alarm) => `Alarm, ${priorityWord[alarm.priority].toLowerCase()}: ${this.#name(alarm)}, ${ruleWord[alarm.rule]}.`).join(' ');
    this.#seen = newest;
  }

  protected override render(): TemplateResult {
    const waiting = [...(this.alarms?.values() ?? [])].filter((alarm) => alarm.state.kind === 'raised' && !this.#aside.has(alarm.id)).sort(byUrgency);
    const first = waiting[0];
    return html`<div role="status" class="unseen">${this.#news}</div>${first === undefined || !this.shown ? nothing : this.#slip(first, waiting.length - 1)}`;
  }

  #name(alarm: Alarm): string {
    return this.#card(alarm)?.name ?? alarm.guarantee;
  }

  #card(alarm: Alarm): GuaranteeCard | undefined {
    return this.cards?.find((card) => card.id === alarm.guarantee);
  }

  #slip(alarm: Alarm, others: number): TemplateResult {
    return html`<section class="slip ${alarm.priority}" aria-label="New alarm">
      <p class="kind"><svg viewBox="0 0 16 16" aria-hidden="true">${priorityMark(alarm.priority)}</svg>New alarm, ${priorityWord[alarm.priority].toLowerCase()}</p>
      <p><a href=${guaranteePath(alarm.guarantee)}>${this.#name(alarm)}</a>: ${ruleWord[alarm.rule].toLowerCase()}${others > 0 ? `. ${this.formats?.count(others) ?? ''} more.` : ''}</p>
      ${alarm.safetyRelevant ? html`<p class="quiet">Safety-relevant: advisory only</p>` : nothing}
      <div class="does">
        ${this.actor?.may('acknowledge', this.#card(alarm)?.line) === true
          ? html`<button class="first" @click=${() => this.dispatchEvent(new AcknowledgeRequest(alarm))}>Acknowledge</button>`
          : nothing}
        <button @click=${() => { this.#aside.add(alarm.id); this.requestUpdate(); }}>Put aside</button>
      </div>
    </section>`;
  }
}

customElements.define('alarm-announcer', AlarmAnnouncer);
