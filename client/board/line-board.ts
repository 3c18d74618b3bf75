import { html, LitElement, nothing, type TemplateResult } from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import { caution } from '../../core/guarantee/caution.ts';
import type { Actor } from '../access/actor.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';
import { styled } from '../look/styled.ts';
import { counted } from '../words.ts';
import './board-lane.ts';
import { boardPlan, type BoardPlan } from './board-plan.ts';
import { BoardRoom } from './board-room.ts';
import { boardScale } from './board-scale.ts';
import type { Lane } from './lane.ts';
import { groupedByLine, nextOrder, orderedLanes, type LaneGroup } from './lane-order.ts';
import { focusedPart } from './focused-part.ts';
import { lanePlotStyle } from './lane-plot-style.ts';
import { laneTops, slideLanes } from './lane-slide.ts';
import { lineBoardStyle } from './line-board-style.ts';
import { OrderHold } from './order-hold.ts';

const lanesCount = (groups: readonly LaneGroup[]): number => groups.reduce((sum, group) => sum + group.lanes.length, 0);

/** All guarantees of the plant, one lane each, sharing one guarantee line; trouble rises to the top. */
export class LineBoard extends LitElement {
  static override properties = {
    lanes: { attribute: false },
    formats: { attribute: false },
    plantNow: { attribute: false },
    wall: { type: Boolean, reflect: true },
    grouped: { type: Boolean },
    actor: { attribute: false },
  };

  static override styles = [base, lanePlotStyle, lineBoardStyle];

  declare lanes: readonly Lane[] | undefined;
  declare formats: Formats | undefined;
  declare plantNow: number;
  declare wall: boolean;
  declare grouped: boolean;
  declare actor: Actor | undefined;

  readonly #room = new BoardRoom(this);
  readonly #hold = new OrderHold(this, () => performance.now());
  #order: readonly string[] = [];
  #held = false;
  #tops: ReadonlyMap<string, number> | undefined;
  #focused: HTMLElement | undefined;
  #plan: BoardPlan | undefined;

  protected override willUpdate(): void {
    const wanted = nextOrder(this.#order, this.lanes ?? []);
    this.#tops = undefined;
    this.#held = wanted !== this.#order && wanted.length === this.#order.length && this.#hold.holds;
    if (this.#held || wanted === this.#order) return;
    this.#order = wanted;
    const list = this.renderRoot.querySelector('.lanes');
    if (list !== null) this.#tops = laneTops(list);
    this.#focused = this.shadowRoot === null ? undefined : focusedPart(this.shadowRoot);
  }

  protected override updated(): void {
    const list = this.renderRoot.querySelector('.lanes');
    if (list !== null && this.#tops !== undefined) slideLanes(list, this.#tops);
    // a lane that is moved in the document loses the focus
    if (this.#focused !== undefined && !this.matches(':focus-within')) this.#focused.focus({ preventScroll: true });
    this.#focused = undefined;
  }

  protected override render(): TemplateResult | typeof nothing {
    const { formats } = this;
    if (this.lanes === undefined || formats === undefined) return nothing;
    if (this.lanes.length === 0) return this.#noGuarantees();
    const lanes = orderedLanes(this.#order, this.lanes);
    const groups = this.grouped ? groupedByLine(lanes) : [{ line: '', lanes }];
    const room = this.#room.room;
    const typePx = room?.typePx ?? 15;
    const headings = this.grouped ? groups.length * typePx * 2.2 : 0;
    this.#plan = room === undefined ? undefined : boardPlan(room, lanes, this.wall, headings + typePx * (this.wall ? 2.6 : 5.2), this.#plan);
    const plan = this.#plan;
    return html`
      ${lanes.every((lane) => lane.view.newest === undefined) ? this.#noRecords() : nothing}
      <div class="board sheet" ${styled({ '--columns': plan?.columns ?? '1fr' })}>
        ${plan === undefined ? html`<div class="lanes"></div>` : this.#board(plan, groups, formats)}
      </div>
      <p class="foot quiet">${this.#caution(lanes)}${this.wall ? nothing : this.#foot(lanes, formats)}</p>
    `;
  }

  #board(plan: BoardPlan, groups: readonly LaneGroup[], formats: Formats): TemplateResult {
    const typePx = plan.form === 'wall' ? (this.#room.room?.typePx ?? 15) : (this.#room.room?.typePx ?? 15) * 0.86;
    return html`
      <div class=${`scale ${plan.form}`}>
        <span class="quiet">Guarantee</span>
        <div>${boardScale(plan.scale, formats, typePx)}</div>
        <span class="quiet">Evidence</span>
        <span class="quiet end">Bound</span>
        ${plan.form === 'desk' ? html`<span class="quiet end">Newest record</span>` : nothing}
      </div>
      <div class=${lanesCount(groups) > 60 && plan.form !== 'card' ? 'lanes many' : 'lanes'}>
        ${groups.map((group) => html`
          ${group.line === '' ? nothing : html`<h2 class="group">${group.line}<span class="quiet">${this.#groupWords(group.lanes, formats)}</span></h2>`}
          <ol aria-label=${group.line === '' ? 'Guarantees, most allowance used first' : `Guarantees of ${group.line}`}>
            ${repeat(group.lanes, (lane) => lane.card.id, (lane) => this.#lane(lane, plan, formats))}
          </ol>`)}
      </div>`;
  }

  #lane(lane: Lane, plan: BoardPlan, formats: Formats): TemplateResult {
    const measure = lane.needsPerson ? plan.loud : plan.calm;
    const height = plan.form === 'card' ? 'auto' : `${measure.height}px`;
    return html`<li data-id=${lane.card.id} ${styled({ height, '--lane-type': `${measure.typePx.toFixed(2)}px`, '--name-type': `${measure.nameTypePx.toFixed(2)}px` })}>
      <board-lane .lane=${lane} .scale=${plan.scale} .height=${measure.height} .size=${measure.size} .form=${plan.form}
        .tone=${lane.tone} .mayAcknowledge=${this.actor?.may('acknowledge', lane.card.line) === true} .formats=${formats} .age=${lane.view.newest === undefined ? undefined : formats.span(this.plantNow - lane.view.newest)}></board-lane>
    </li>`;
  }

  #groupWords(lanes: readonly Lane[], formats: Formats): string {
    const needing = lanes.filter((lane) => lane.needsPerson).length;
    return needing === 0 ? counted(formats, lanes.length, 'guarantee') : `${formats.count(needing)} of ${counted(formats, lanes.length, 'guarantee')} need you`;
  }

  #caution(lanes: readonly Lane[]): TemplateResult | typeof nothing {
    if (!lanes.some((lane) => lane.card.safetyRelevant)) return nothing;
    return html`<strong>${caution.title}.</strong> ${caution.sentences.join(' ')}<br />`;
  }

  #foot(lanes: readonly Lane[], formats: Formats): TemplateResult {
    const levels = [...new Set(lanes.map((lane) => lane.card.confidence))].map((level) => formats.confidence(level));
    return html`${this.#held ? html`<strong>The lanes wait with their new order while you are among them.</strong> ` : nothing}
      The dot is what was seen, the tip of the whisker the ${levels.length === 1 ? `${levels[0] ?? ''} ` : ''}bound. A tip left of the guarantee line: demonstrated. Small strokes below: where the tip stood in the last hour. An upright mark: the opposite bound has passed the line too. Scale: allowance used, 0 % at the target, 100 % on the line.`;
  }

  #noGuarantees(): TemplateResult {
    return html`<section class="empty sheet lanes">
      <h2>This plant has no guarantees yet</h2>
      <p>A guarantee says what was promised of a product: a quantity, a side and a value. Name one in the plant file and reload it; its lane appears here.</p>
    </section>`;
  }

  #noRecords(): TemplateResult {
    return html`<section class="empty note sheet">
      <h2>No records yet</h2>
      <p>No source has sent a verdict, count or measurement. The lanes below fill as soon as the first one does.</p>
    </section>`;
  }
}

customElements.define('line-board', LineBoard);
