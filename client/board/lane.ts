import type { Alarm } from '../../core/alarm/alarm.ts';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import { byUrgency, needsPerson, toneOf, type Tone } from '../attention.ts';
import type { LivePicture } from '../feed/live-picture.ts';

/** One guarantee as the board draws it. */
export interface Lane {
  readonly card: GuaranteeCard;
  readonly view: GuaranteeView;
  /** Alarms that have not ended, the most urgent first. */
  readonly alarms: readonly Alarm[];
  readonly tone: Tone;
  readonly needsPerson: boolean;
}

const sameAlarms = (a: readonly Alarm[], b: readonly Alarm[]): boolean => a.length === b.length && a.every((alarm, index) => alarm === b[index]);

/**
 * Lanes of every guarantee the server has sent a view of, in the order of the plant file. A lane of which nothing
 * changed is the same object as before, so that it need not be drawn anew.
 */
export function lanesOf(picture: LivePicture, before: readonly Lane[] = []): readonly Lane[] {
  const old = new Map(before.map((lane) => [lane.card.id, lane]));
  const open = new Map<string, Alarm[]>();
  for (const alarm of picture.alarms.values()) {
    if (alarm.state.kind === 'ended') continue;
    const of = open.get(alarm.guarantee);
    if (of === undefined) open.set(alarm.guarantee, [alarm]);
    else of.push(alarm);
  }
  return picture.cards.flatMap((card) => {
    const view = picture.views.get(card.id);
    if (view === undefined) return [];
    const alarms = (open.get(card.id) ?? []).sort(byUrgency);
    const same = old.get(card.id);
    if (same?.card === card && same.view === view && sameAlarms(same.alarms, alarms)) return [same];
    return [{ card, view, alarms, tone: toneOf(view, alarms), needsPerson: needsPerson(view, alarms) }];
  });
}
