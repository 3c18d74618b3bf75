import type { Alarm } from '../core/alarm/alarm.ts';
import type { GuaranteeView } from '../core/view/guarantee-view.ts';

/** How loudly a lane speaks. Grey ('calm') is what is fine; 'blank' says that nothing can be said. */
export type Tone = 'harm' | 'care' | 'blank' | 'calm';

export const isActive = (alarm: Alarm): boolean => alarm.state.kind === 'raised' || alarm.state.kind === 'acknowledged';
export const isWaiting = (alarm: Alarm): boolean => alarm.state.kind === 'raised' || alarm.state.kind === 'returned';

/** From the decided state and the decided alarms; no figure is compared here. */
export function toneOf(view: GuaranteeView, alarms: readonly Alarm[]): Tone {
  const active = alarms.filter(isActive);
  if (view.state === 'violated' || active.some((alarm) => alarm.rule === 'violation')) return 'harm';
  if (view.state === 'unknown') return 'blank';
  return view.state === 'undecided' || active.length > 0 ? 'care' : 'calm';
}

/** Whether a person is wanted: the evidence is against, lost or missing, or an alarm waits for its acknowledgement. */
export const needsPerson = (view: GuaranteeView, alarms: readonly Alarm[]): boolean =>
  toneOf(view, alarms) !== 'calm' || alarms.some(isWaiting);

const priorities = { high: 0, medium: 1, low: 2 } as const;
const kinds = { raised: 0, returned: 1, acknowledged: 2, ended: 3 } as const;

/** Alarms in the order a person should take them: waiting first, then by priority, the newest first. */
export const byUrgency = (a: Alarm, b: Alarm): number =>
  kinds[a.state.kind] - kinds[b.state.kind] || priorities[a.priority] - priorities[b.priority] || b.raisedAt - a.raisedAt || b.id - a.id;
