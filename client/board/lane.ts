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

/** Lanes of every guarantee the server has sent a view of, in the order of the plant file. */
export function lanesOf(picture: LivePicture): readonly Lane[] {
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
    return [{ card, view, alarms, tone: toneOf(view, alarms), needsPerson: needsPerson(view, alarms) }];
  });
}
