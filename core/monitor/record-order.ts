import type { Happening } from './happening.ts';

/** Happenings put into order, and the ids that alarms raised among them get by it (old to new; empty where none changes). */
export interface RecordOrder {
  readonly happenings: readonly Happening[];
  readonly alarmIds: ReadonlyMap<number, number>;
}

/**
 * Puts happenings told while the records of one part were taken into the order of these records; those of one record
 * keep the order in which they were told. Alarms raised among them are numbered in that order.
 *
 * @param sequences sequence of the record in hand when each was told, same length
 */
export function inRecordOrder(happenings: readonly Happening[], sequences: readonly number[]): RecordOrder {
  const order = happenings.map((_, index) => index).sort((a, b) => (sequences[a] as number) - (sequences[b] as number) || a - b);
  const sorted = order.map((index) => happenings[index] as Happening);
  const raised = sorted.flatMap((one) => (one.kind === 'alarm' && one.change === 'raised' ? [one.alarm.id] : []));
  const ids = [...raised].sort((a, b) => a - b);
  const alarmIds = new Map(raised.map((old, place) => [old, ids[place] as number] as const).filter(([old, now]) => old !== now));
  if (alarmIds.size === 0) return { happenings: sorted, alarmIds };
  return {
    happenings: sorted.map((one) => (one.kind === 'alarm' ? { ...one, alarm: { ...one.alarm, id: alarmIds.get(one.alarm.id) ?? one.alarm.id } } : one)),
    alarmIds,
  };
}
