import { describe, expect, it } from 'vitest';
import { Monitor } from '../../../core/monitor/monitor.ts';
import type { Tail } from '../../../core/units.ts';
import { togetherOf } from '../../../core/view/together.ts';
import { feed, monday, plantOfText } from '../evidence/evidence-plant.ts';
import { bad, good } from '../evidence/watch-one.ts';

const one = (id: string, atMost: string): string => `  - { id: ${id}, station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: ${atMost}, window: run }`;
const chain = '  - { id: chain, stations: [A.cutting, A.leak], characteristics: [cut, tightness], quantity: chained-yield, at-least: 95 %, window: run }';

describe('guarantees said together', () => {
  it('are named by the evidence of their runs, the strongest first; one without such evidence is left out', () => {
    const monitor = new Monitor(plantOfText([one('loose', '10 %'), one('middle', '3 %'), one('tight', '0.1 %'), chain].join('\n')), 'v');
    expect(togetherOf(monitor.watches, 0.05 as Tail)).toEqual({ tail: 0.05, demonstrated: [], among: 3, left: ['chain'] });
    const timed = (part: object, start: number): never => ({ ...part, time: { kind: 'steady', start, step: 1 } }) as never;
    feed(monitor, [timed(bad(1), monday), timed(good(600), monday + 10)], 1);
    expect(togetherOf(monitor.watches, 0.05 as Tail)).toEqual({ tail: 0.05, demonstrated: ['loose', 'middle'], among: 3, left: ['chain'] });
    expect(togetherOf(monitor.watches, 1e-9 as Tail).demonstrated).toEqual(['loose']);
  });
});
