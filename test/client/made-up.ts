import type { Alarm } from '../../core/alarm/alarm.ts';
import type { LiveSnapshot } from '../../core/live/message.ts';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import { formatsFor, type Formats } from '../../client/format.ts';
import { toneOf, needsPerson } from '../../client/attention.ts';
import type { Lane } from '../../client/board/lane.ts';

/** A card, view, alarm and snapshot of the leak test on hose line A, with parts replaced. */
export const card = (part: Partial<GuaranteeCard> = {}): GuaranteeCard => ({
  id: 'leak-a', name: 'BH-4 leak test', line: 'a', lineName: 'Hose line A', stationNames: ['Leak test'], product: undefined, productName: undefined,
  characteristicName: 'seal integrity', quantity: 'nonconforming-fraction', side: 'at-most', scale: { kind: 'share' }, guaranteeLine: 200e-6, target: 0,
  confidence: '0.95', tail: 0.05, window: { kind: 'units', units: 50_000 }, looks: 'one look', safetyRelevant: false, specificationLimit: undefined,
  method: { name: 'Exact binomial bound', sentence: '', assumes: [], source: '' }, ...part,
});

export const view = (part: Partial<GuaranteeView> = {}): GuaranteeView => ({
  id: 'leak-a', state: 'demonstrated', remark: undefined, since: 0, lookRule: 'one look', estimate: 60e-6, bound: 148e-6, oppositeBound: undefined,
  allowance: { estimate: 0.3, bound: 0.74, opposite: undefined, trail: [] }, figures: {}, margin: {}, newest: 1000, drift: undefined, product: undefined,
  lot: undefined, alarmIds: [], lineRunning: true, warnings: [], detector: undefined, oppositeLookRule: 'one look', run: undefined, ...part,
});

export const alarm = (part: Partial<Alarm> = {}): Alarm => ({
  id: 1, guarantee: 'leak-a', rule: 'crossing', priority: 'medium', safetyRelevant: false, raisedAt: 0 as never, times: 1, state: { kind: 'raised' }, response: '',
  grounds: { source: undefined, sequence: undefined, plantVersion: '', method: '', methodVersion: 1, lookRule: 'one look', figures: {}, records: [], sentence: '' }, ...part,
});

export const lane = (id: string, bound: number, part: Partial<GuaranteeView> = {}, alarms: readonly Alarm[] = []): Lane => {
  const of = view({ id, allowance: { estimate: bound / 2, bound, opposite: undefined, trail: [] }, ...part });
  return { card: card({ id, name: id }), view: of, alarms, tone: toneOf(of, alarms), needsPerson: needsPerson(of, alarms) };
};

export const snapshot = (part: Partial<LiveSnapshot> = {}): LiveSnapshot => ({
  type: 'snapshot', boot: 'b1', revision: 7, at: 1_000_000, clockRate: 60, demo: true,
  plant: { name: 'Hose plant', timeZone: 'Europe/Vienna', version: 'v', lines: [], shift: undefined },
  cards: [card()], views: [view()], alarms: [], ...part,
});

export const english: Formats = formatsFor('en-GB', 'Europe/Vienna', 'ppm');

/** Spaces that hold figure and unit together, as ordinary ones. */
export const loose = (text: string): string => text.replace(/\u00a0/g, ' ');
