import { describe, expect, it } from 'vitest';
import { AlarmDesk } from '../../../core/alarm/alarm-desk.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import type { AlarmRule } from '../../../core/plant/guarantee.ts';
import type { EpochMs } from '../../../core/units.ts';
import { plantWith } from '../monitor/example-plant.ts';

const guarantee = plantWith('    at-most: 1 %\n    window: { units: 1000 }').guarantees[0]!;
const rule = (kind: AlarmRule['kind']): AlarmRule => guarantee.rules.find((one) => one.kind === kind)!;
const at = (ms: number): EpochMs => ms as EpochMs;
const grounds = (): never => ({ sentence: 'because' }) as never;

describe('an alarm desk', () => {
  it('[A4] lets one occurrence of a rule stand at a time, with ids that only rise', () => {
    const told: Happening[] = [];
    const desk = new AlarmDesk((one) => told.push(one));
    desk.raise(guarantee, rule('crossing'), at(1), grounds);
    desk.raise(guarantee, rule('crossing'), at(2), grounds);
    desk.raise(guarantee, rule('violation'), at(3), grounds);
    expect(desk.standing().map(({ id, rule: kind, times }) => [id, kind, times])).toEqual([[1, 'crossing', 1], [2, 'violation', 1]]);
    desk.acknowledge(1, 'Mette', '', at(4));
    desk.returned('leak-A', 'crossing', at(5));
    desk.raise(guarantee, rule('crossing'), at(6), grounds);
    expect(desk.standing().map(({ id }) => id)).toEqual([2, 3]);
    expect(told.map((one) => one.kind === 'alarm' && `${one.alarm.id} ${one.change}`)).toEqual(['1 raised', '2 raised', '1 acknowledged', '1 ended', '3 raised']);
  });

  it('[A2] counts how often a condition came back', () => {
    const told: Happening[] = [];
    const desk = new AlarmDesk((one) => told.push(one));
    desk.raise(guarantee, rule('crossing'), at(1), grounds);
    desk.returned('leak-A', 'crossing', at(2));
    desk.raise(guarantee, rule('crossing'), at(3), grounds);
    expect(desk.standing()).toMatchObject([{ id: 1, times: 2, state: { kind: 'raised' } }]);
    expect(told.at(-1)).toMatchObject({ change: 'again' });
  });

  it('goes on from its snapshot', () => {
    const desk = new AlarmDesk(() => undefined);
    desk.raise(guarantee, rule('crossing'), at(1), grounds);
    const again = new AlarmDesk(() => undefined);
    again.restore(structuredClone(desk.snapshot()));
    again.returned('leak-A', 'crossing', at(2));
    expect(again.standing()).toMatchObject([{ id: 1, state: { kind: 'returned', returnedAt: 2 } }]);
    again.raise(guarantee, rule('violation'), at(3), grounds);
    expect(again.standing().at(-1)!.id).toBe(2);
  });
});
