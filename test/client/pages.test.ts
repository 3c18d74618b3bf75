import { describe, expect, it } from 'vitest';
import { timeTicks, valueTicks, zoneOffset } from '../../client/guarantee/axis-ticks.ts';
import { stoppedSpans } from '../../client/guarantee/history-event.ts';
import { historyFrame, valueRange } from '../../client/guarantee/history-frame.ts';
import { statePaths, valuePath } from '../../client/guarantee/history-paths.ts';
import { normalCurve } from '../../client/guarantee/normal-curve.ts';
import { rangeStart, ranges } from '../../client/guarantee/range-choice.ts';
import { guaranteePath, routeOf } from '../../client/route.ts';
import { defaultSettings, readSettings, settingsIn, type Settings } from '../../client/settings.ts';
import type { History } from '../../core/view/history.ts';
import { card } from './made-up.ts';

const history: History = {
  guarantee: 'leak-a', from: 0, to: 4000, stepMs: 1000, at: [0, 1000, 2000, 3000], inspected: [1, 1, 1, 1], nonconforming: [0, 0, 0, 0],
  estimate: [null, null, null, null], bound: [1e-4, null, 1.5e-4, 3e-4], opposite: [null, null, null, null],
  state: ['demonstrated', 'demonstrated', 'demonstrated', 'undecided'], events: [],
};

describe('addresses', () => {
  it('an id survives its address, whatever stands in it', () => {
    for (const id of ['leak-a', 'a.b_c', 'ä/ö 1']) expect(routeOf(guaranteePath(id))).toEqual({ kind: 'guarantee', id });
  });

  it('knows its pages and owns up to others', () => {
    expect(routeOf('/')).toEqual({ kind: 'board' });
    expect(routeOf('/alarms')).toEqual({ kind: 'alarms' });
    expect(routeOf('/guarantees/%E0%A4%A')).toEqual({ kind: 'nowhere', path: '/guarantees/%E0%A4%A' });
    expect(routeOf('/elsewhere').kind).toBe('nowhere');
  });
});

describe('settings', () => {
  it('what is stored comes back; what cannot be read falls back field by field', () => {
    expect(readSettings('{"shareUnit":"%","theme":"pink","grouped":true}')).toEqual({ ...defaultSettings, shareUnit: '%', grouped: true });
    expect(readSettings('not json')).toEqual(defaultSettings);
    expect(readSettings(null)).toEqual(defaultSettings);
  });

  it('a change is kept and told', () => {
    const kept = new Map<string, string>();
    const desk = settingsIn({ getItem: (key) => kept.get(key) ?? null, setItem: (key, text) => void kept.set(key, text) });
    const told: Settings[] = [];
    const subscription = desk.settings$.subscribe((settings) => told.push(settings));
    desk.change({ personName: 'Ines' });
    subscription.unsubscribe();
    expect(told.at(-1)?.personName).toBe('Ines');
    expect(readSettings([...kept.values()][0] ?? null).personName).toBe('Ines');
  });
});

describe('axes', () => {
  it('values are round and inside', () => {
    expect(valueTicks(0, 480, 5)).toEqual([0, 100, 200, 300, 400]);
    expect(valueTicks(249.8, 252.1, 5).map((tick) => Number(tick.toFixed(6)))).toEqual([250, 250.5, 251, 251.5, 252]);
    expect(valueTicks(1, 1, 5)).toEqual([]);
  });

  it('times are whole hours of the plant’s clock, also where it is half an hour off', () => {
    const at = Date.UTC(2026, 2, 3, 8, 12);
    const offset = zoneOffset('Asia/Kolkata', at);
    expect(offset).toBe(19_800_000);
    for (const tick of timeTicks(at, at + 6 * 3_600_000, 7, offset)) expect((tick + offset) % 3_600_000).toBe(0);
    expect(zoneOffset('Europe/Vienna', Date.UTC(2026, 2, 29, 2))).toBe(7_200_000);
  });

  it('a shift’s range begins with the shift', () => {
    const shift = ranges.find(({ name }) => name === 'Shift') ?? { name: '', spanMs: 1 };
    expect(rangeStart(shift, 10_000_000, { name: 'early', since: 4_000_000, until: 0 })).toBe(4_000_000);
    expect(rangeStart(shift, 100_000_000, undefined)).toBe(100_000_000 - 28_800_000);
  });
});

describe('history', () => {
  it('a bound of 1 while gathering does not squeeze the line’s surroundings', () => {
    const [low, high] = valueRange(card(), { ...history, bound: [1, 0.5, 1e-4, 1e-4] });
    expect(low).toBe(0);
    expect(high).toBeCloseTo(1e-3, 9);
  });

  it('lines are broken where there is no value, and pieces of a state join', () => {
    const frame = historyFrame(800, card(), history, 60);
    expect(valuePath(frame, history.at, history.bound).match(/M/g)).toHaveLength(2);
    const paths = statePaths(frame, history.at, history.bound, history.state);
    expect(paths.map((path) => path.state)).toEqual(['demonstrated', 'undecided']);
    expect(paths[0]?.d.endsWith(paths[1]?.d.slice(1) ?? 'x')).toBe(true);
  });

  it('a stop without an end lasts until now', () => {
    const mark = (at: number, kind: 'line-stopped' | 'line-running') => ({ kind: 'line', at: at as never, line: 'a', mark: kind, detail: '' }) as const;
    expect(stoppedSpans([mark(10, 'line-stopped'), mark(20, 'line-running'), mark(30, 'line-stopped')], 50)).toEqual([[10, 20], [30, 50]]);
  });

  it('the drawn density holds an area of one', () => {
    const points = normalCurve(10, 2, -10, 30, 400);
    const area = points.reduce((sum, [, density]) => sum + density * 0.1, 0);
    expect(area).toBeCloseTo(1, 6);
    expect(normalCurve(0, 0, 0, 1, 5)).toEqual([]);
  });
});
