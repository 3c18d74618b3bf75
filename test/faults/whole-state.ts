import type { Alarm } from '../../core/alarm/alarm.ts';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import { getJson } from './harness.ts';
import { begin } from './stream.ts';

/** Everything a server tells about what it has taken. */
export interface WholeState {
  readonly guarantees: readonly { readonly card: GuaranteeCard; readonly view: GuaranteeView }[];
  readonly standing: readonly Alarm[];
  readonly ended: readonly Alarm[];
  readonly happenings: readonly unknown[];
  /** History by minutes, strip of units and picture, by guarantee. */
  readonly pages: Readonly<Record<string, unknown>>;
}

const hour = 3_600_000;

export async function wholeState(address: string): Promise<WholeState> {
  const api = <T>(path: string): Promise<T> => getJson<T>(`${address}/api/${path}`);
  const guarantees = await api<WholeState['guarantees']>('guarantees');
  const pages: Record<string, unknown> = {};
  for (const { card } of guarantees) {
    const minutes = await api(`guarantees/${card.id}/history?from=${begin - hour}&to=${begin + 99 * hour}&points=10000`);
    pages[card.id] = { minutes, strip: await api(`guarantees/${card.id}/strip`), picture: await api(`guarantees/${card.id}/picture`) };
  }
  return {
    guarantees,
    standing: await api('alarms/standing'),
    ended: await api('alarms?limit=1000'),
    happenings: await api('events?limit=10000'),
    pages,
  };
}
