import type { Alarm } from '../../core/alarm/alarm.ts';
import type { LiveBeat, LiveChange, LiveMessage, LiveSnapshot, PlantCard } from '../../core/live/message.ts';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import type { PlantClock } from './plant-clock.ts';

/** All a dashboard knows of the plant, as the server last told it. */
export interface LivePicture {
  readonly boot: string;
  readonly revision: number;
  readonly clock: PlantClock;
  readonly demo: boolean;
  readonly plant: PlantCard;
  readonly cards: readonly GuaranteeCard[];
  readonly views: ReadonlyMap<string, GuaranteeView>;
  readonly alarms: ReadonlyMap<number, Alarm>;
}

const keyed = <K, T>(items: readonly T[], keyOf: (item: T) => K): ReadonlyMap<K, T> =>
  new Map(items.map((item) => [keyOf(item), item]));

function patched<K, T>(old: ReadonlyMap<K, T>, items: readonly T[], keyOf: (item: T) => K): ReadonlyMap<K, T> {
  if (items.length === 0) return old;
  const next = new Map(old);
  for (const item of items) next.set(keyOf(item), item);
  return next;
}

function pictureOf(told: LiveSnapshot, heardAt: number): LivePicture {
  return {
    boot: told.boot,
    revision: told.revision,
    clock: { at: told.at, heardAt, rate: told.clockRate },
    demo: told.demo,
    plant: { ...told.plant, shift: told.plant.shift ?? undefined },
    cards: told.cards,
    views: keyed(told.views, (view) => view.id),
    alarms: keyed(told.alarms, (alarm) => alarm.id),
  };
}

const set = (old: LivePicture, told: LiveChange | LiveBeat, heardAt: number): LivePicture => ({
  ...old,
  revision: told.revision,
  clock: { ...old.clock, at: told.at, heardAt },
});

/**
 * The picture after a message. A change or beat without a snapshot before it says nothing that could be drawn: the
 * picture stays absent.
 *
 * @param heardAt  when the message came, ms of this browser's steady clock
 */
export function nextPicture(old: LivePicture | undefined, told: LiveMessage, heardAt: number): LivePicture | undefined {
  switch (told.type) {
    case 'snapshot':
      return pictureOf(told, heardAt);
    case 'beat':
      return old === undefined ? undefined : set(old, told, heardAt);
    case 'change': {
      if (old === undefined) return undefined;
      const next = set(old, told, heardAt);
      return {
        ...next,
        plant: 'shift' in told ? { ...old.plant, shift: told.shift ?? undefined } : old.plant,
        views: patched(old.views, told.views, (view) => view.id),
        alarms: patched(old.alarms, told.alarms, (alarm) => alarm.id),
      };
    }
    case 'stopping':
      return old;
  }
}
