import { describe, expect, it } from 'vitest';
import { demonstrationExposure } from '../../../core/bound/critical-exposure.ts';
import { demonstrationUnits } from '../../../core/bound/critical-count.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import type { Tail } from '../../../core/units.ts';
import { bad, cuts, fills, good, lotStart, WatchOne } from './watch-one.ts';

const quiet = 'silence: off, bad-data: off';
const leak = 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 2 %, confidence: 90 %';
const fill = 'station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 251 ml';
const beyond = 'station: A.filling, characteristic: fill, quantity: fraction-beyond-limit, specification-limit: { below: 248 ml }, at-most: 3 %, confidence: 90 %';

/** Values with a nearly normal spread of 1 about `mean`. */
function near(mean: number, records: number, seed: number): number[] {
  const uniform = seededUniform(seed);
  return Array.from({ length: records }, () => mean - 6 + Array.from({ length: 12 }, uniform).reduce((a, b) => a + b));
}

describe('a window of time', () => {
  const plan = `${leak}, window: { time: 10 min, step: 1 min }, alarms: { ${quiet} }`;

  it('[W5] demonstrates with the unit that is enough, and gathers again when the units have left by the clock', () => {
    const one = new WatchOne(plan);
    const enough = demonstrationUnits(0, 0.02, 0.1 as Tail);
    one.take(good(enough - 1));
    expect(one.state).toBe('gathering');
    one.take(good(1));
    expect(one.state).toBe('demonstrated');
    one.monitor.advance((one.monitor.now + 8 * 60_000) as never);
    expect(one.state).toBe('demonstrated');
    one.monitor.advance((one.monitor.now + 5 * 60_000) as never);
    expect([one.state, one.watch.evidence.figures()['inspected'], one.watch.evidence.nextDue()]).toEqual(['gathering', 0, Infinity]);
  });

  it('calls no violation before it has covered its span, and none after a pause that emptied it', () => {
    const one = new WatchOne(plan);
    one.take(bad(30), good(200));
    expect(one.state).toBe('undecided');
    one.take(good(200), bad(30), good(200));
    expect(one.state).toBe('violated');
    one.pause(3_600_000);
    one.take(bad(30), good(200));
    expect(one.state).toBe('undecided');
  });
});

describe('evidence on a rate', () => {
  const plan = `station: A.cutting, characteristic: surface, quantity: rate, at-most: 4 per 100 m, confidence: 90 %, window: run, alarms: { ${quiet} }`;

  it('demonstrates with the exposure that is enough, told in any pieces', () => {
    const enough = demonstrationExposure(0, 0.04, 0.1 as Tail);
    const one = new WatchOne(plan);
    one.take(cuts([0, 0], [enough / 2, enough / 2 - 0.01]));
    expect(one.state).toBe('gathering');
    one.take(cuts([0], [0.02]));
    expect([one.state, one.watch.evidence.margin()]).toEqual(['demonstrated', { canTake: 0 }]);
    expect(one.watch.evidence.bounds().bound).toBeCloseTo(4, 2);
  });

  it('takes verdicts as an exposure of one unit each', () => {
    const one = new WatchOne(plan);
    one.take({ ...good(100), origin: { station: 'A.cutting', product: 'BH-4', characteristic: 'surface', lot: undefined } } as never);
    expect(one.watch.evidence.figures()).toMatchObject({ count: 0, exposure: 100, records: 100 });
  });
});

describe('claims beyond belief', () => {
  it('cost no memory and no error', () => {
    const rate = new WatchOne(`station: A.cutting, characteristic: surface, quantity: rate, at-most: 4 per 100 m, window: run, alarms: { ${quiet} }`);
    rate.take(cuts([4_000_000_000], [1]), cuts([0], [1e300]), cuts([4_000_000_000], [1]));
    expect([rate.state, rate.watch.evidence.bounds().bound]).toEqual(['demonstrated', expect.any(Number)]);
    rate.take(cuts([0, 0], [1.7e308, 1.7e308]));
    expect([rate.state, rate.watch.evidence.bounds().bound]).toEqual(['unknown', undefined]);
    const edge = new WatchOne(`${fill}, range: { from: 249.1 ml, to: 252.3 ml }, window: run, alarms: { ${quiet} }`);
    edge.take(fills(Array.from({ length: 3000 }, () => 252.3)));
    expect([edge.state, edge.watch.evidence.bounds().estimate]).toEqual(['demonstrated', expect.closeTo(252.3, 9)]);
  });
});

describe('evidence on a mean', () => {
  it('is unknown while all values are alike, and while a value lies outside the stated range', () => {
    const stuck = new WatchOne(`${fill}, window: { units: 20 }, alarms: { ${quiet} }`);
    stuck.take(fills(Array.from({ length: 12 }, () => 252)));
    expect([stuck.state, stuck.watch.standing.remark]).toEqual(['unknown', expect.stringContaining('alike')]);
    stuck.take(fills([252.5]));
    expect([stuck.state, stuck.watch.standing.remark]).toEqual(['demonstrated', undefined]);
    const ranged = new WatchOne(`${fill}, range: { from: 249 ml, to: 253 ml }, window: { units: 200 }, alarms: { ${quiet} }`);
    ranged.take(fills(near(251, 400, 3).map((value) => Math.min(253, Math.max(249, value)))));
    expect(ranged.state).toBe('demonstrated');
    ranged.take(fills([253.1]));
    expect([ranged.state, ranged.watch.evidence.bounds().bound]).toEqual(['unknown', undefined]);
    ranged.take(fills(Array.from({ length: 200 }, (_, place) => 252 + (place % 2) / 2)));
    expect(ranged.state).toBe('demonstrated');
  });

  it('calls no violation before its window is full', () => {
    const one = new WatchOne(`${fill}, window: { units: 100 }, alarms: { ${quiet} }`);
    one.take(fills(near(247, 99, 11)));
    expect(one.state).toBe('undecided');
    one.take(fills([247]));
    expect(one.state).toBe('violated');
  });

  it('is unknown, and no error, for a value beyond all that can be computed with', () => {
    const one = new WatchOne(`${fill}, window: { units: 20 }, alarms: { ${quiet} }`);
    one.take(fills([...near(252, 20, 4), 1e200]));
    expect(one.state).toBe('unknown');
    one.take(fills(near(252, 20, 5)));
    expect(one.state).toBe('demonstrated');
  });

  it('says that the values are skewed against the bound', () => {
    const one = new WatchOne(`${fill}, window: run, alarms: { ${quiet} }`);
    const uniform = seededUniform(9);
    one.take(fills(Array.from({ length: 300 }, () => 253 + Math.log(uniform()))));
    expect(one.watch.evidence.warnings()).toEqual([expect.stringContaining('skewed against the bound')]);
  });
});

describe('evidence on the fraction beyond a limit', () => {
  it('by the normal model is unknown where the values do not fit it, and says so', () => {
    const one = new WatchOne(`${beyond}, model: normal, window: { units: 400 }, alarms: { ${quiet} }`);
    one.take(fills(near(251, 400, 6)));
    expect(one.state).toBe('demonstrated');
    const uniform = seededUniform(7);
    one.take(fills(Array.from({ length: 400 }, () => 253 + Math.log(uniform()))));
    expect([one.state, one.watch.standing.remark]).toEqual(['unknown', expect.stringContaining('do not fit the normal model')]);
    expect(one.watch.evidence.bounds()).toEqual({ estimate: undefined, bound: undefined, opposite: undefined });
    expect(one.watch.evidence.picture?.()).toMatchObject({ kind: 'distribution', model: { verdict: 'does not fit' } });
  });

  it('by counting shows the values of its window with an edge on the limit', () => {
    const one = new WatchOne(`${beyond}, window: { units: 400 }, alarms: { ${quiet} }`);
    const values = near(249.5, 500, 8);
    one.take(fills(values));
    const picture = one.watch.evidence.picture?.();
    if (picture?.kind !== 'distribution') throw new Error('no distribution');
    expect(picture.edges).toHaveLength(picture.counts.length + 1);
    const belowLimit = picture.counts.reduce((sum, count, bin) => sum + ((picture.edges[bin + 1] as number) <= 248 ? count : 0), 0);
    expect([picture.counts.reduce((a, b) => a + b), belowLimit]).toEqual([400, values.slice(100).filter((value) => value < 248).length]);
    expect(one.watch.evidence.figures()['nonconforming']).toBe(belowLimit);
  });
});

describe('the picture of values', () => {
  const shown = (values: readonly number[], side = 'below', limit = 248) => {
    const one = new WatchOne(`${beyond.replace('below: 248 ml', `${side}: ${limit} ml`)}, window: { units: 400 }, alarms: { ${quiet} }`);
    one.take(fills(values));
    const picture = one.watch.evidence.picture?.();
    if (picture?.kind !== 'distribution') throw new Error('no distribution');
    return picture;
  };

  it('has bins of whole steps of the values, so that it has no teeth', () => {
    // 0.5 ml steps, each value as often as the next: bins of an eighth of the spread would hold now one, now none.
    const { counts, edges } = shown(Array.from({ length: 400 }, (_, i) => 245 + (i % 20) / 2));
    expect(counts).toEqual(Array.from({ length: 20 }, () => 20));
    expect(edges[1]! - edges[0]!).toBeCloseTo(0.5, 12);
  });

  it('has no value on an edge: one on the limit stands on the side where it conforms', () => {
    const { edges } = shown([247, 248, 248, 249, 251.5, 250, 250.5]);
    expect(edges.some((edge) => Math.abs(edge - 247.75) < 1e-9)).toBe(true);
  });

  it('of values finer than its bins has an edge on the limit', () => {
    const uniform = seededUniform(3);
    const { edges } = shown(Array.from({ length: 400 }, () => 250 + 3 * uniform()));
    expect(edges.some((edge) => Math.abs((edge - 248) / (edges[1]! - edges[0]!) - Math.round((edge - 248) / (edges[1]! - edges[0]!))) < 1e-6)).toBe(true);
  });
});

describe('evidence on time', () => {
  it('shows its window part by part', () => {
    const one = new WatchOne(`station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 5 %, window: { time: 1 h, step: 10 min }, alarms: { ${quiet} }`);
    expect(one.watch.evidence.picture?.()).toEqual({ kind: 'none' });
    one.take(good(100));
    const picture = one.watch.evidence.picture?.();
    if (picture?.kind !== 'steps') throw new Error('no steps');
    expect([picture.stepMs, picture.inspected.length, picture.inspected.reduce((a, b) => a + b), picture.nonconforming.reduce((a, b) => a + b)]).toEqual([600_000, 7, 100, 0]);
  });
});

describe('evidence on a lot', () => {
  const plan = `station: A.leak, characteristic: outgoing, quantity: lot-fraction, at-most: 4 %, confidence: 90 %, alarms: { ${quiet} }`;

  it('is unknown until the size is told, and judges by the lot that runs', () => {
    const one = new WatchOne(plan);
    one.take(good(60, 'outgoing'));
    expect([one.state, one.watch.standing.remark]).toEqual(['unknown', 'The lot size has not been told.']);
    one.take(lotStart('L-1', 100), good(36, 'outgoing'));
    expect(one.state).toBe('gathering');
    // Of 100 units at most 4 are allowed; P(none of n | 5 of 100) is 0.102 at n = 36 and 0.097 at 37 (hypergeometric, by hand).
    one.take(good(1, 'outgoing'));
    expect(one.state).toBe('demonstrated');
    one.take(lotStart('L-2', 1000), good(37, 'outgoing'));
    expect(one.state).toBe('gathering');
  });

  it('calls a violation as soon as more are found than the lot may hold, and is unknown beyond the lot', () => {
    const one = new WatchOne(plan);
    one.take(lotStart('L-1', 50), bad(3, 'outgoing'));
    expect([one.state, one.watch.evidence.bounds().bound]).toEqual(['violated', 1]);
    one.take(good(47, 'outgoing'));
    expect([one.state, one.watch.evidence.bounds()]).toEqual(['violated', { estimate: 0.06, bound: 0.06, opposite: 0.06 }]);
    one.take(good(1, 'outgoing'));
    expect([one.state, one.watch.evidence.bounds().bound]).toEqual(['unknown', undefined]);
  });
});

describe('evidence on a chain', () => {
  it('gathers until every station has seen enough, and names the station that limits it', () => {
    const one = new WatchOne(`stations: [A.cutting, A.leak], characteristics: [cut, tightness], quantity: chained-yield, at-least: 95 %, confidence: 90 %, window: { units: 400 }, alarms: { ${quiet} }`);
    one.take(good(400, 'cut'));
    expect(one.state).toBe('gathering');
    one.take(good(400));
    expect(one.state).toBe('demonstrated');
    one.take(bad(40, 'cut'));
    expect([one.state, one.watch.evidence.figures()['limitingStation']]).toEqual(['violated', 1]);
    expect(one.watch.evidence.picture?.()).toMatchObject({ kind: 'stations', stations: [{ id: 'A.cutting', nonconforming: 40, limiting: true }, { id: 'A.leak', limiting: false }] });
    expect(one.watch.evidence.warnings()[0]).toBe('Cutting holds the bound down most.');
  });
});

describe('a chain in time', () => {
  it('lets go of all stations at once: no state in between is told', () => {
    const one = new WatchOne(`stations: [A.cutting, A.leak], characteristics: [cut, tightness], quantity: chained-yield, at-least: 95 %, confidence: 90 %, window: { time: 10 min, step: 10 min }, alarms: { ${quiet} }`);
    one.take(bad(30, 'cut'), good(200, 'cut'), good(200));
    one.pause(600_000 - 430_000);
    one.take(good(100, 'cut'));
    one.monitor.decisions();
    expect(one.state).toBe('violated');
    one.monitor.advance((Math.floor(one.monitor.now / 600_000) * 600_000 + 600_000) as never);
    const states = one.monitor.decisions().happenings.flatMap((happening) => (happening.kind === 'evidence' ? [happening.to] : []));
    expect([states, one.watch.evidence.figures()['inspected']]).toEqual([['gathering'], 100]);
  });
});

describe('units in clusters', () => {
  it('are said to be so, with the remedy, and scattered ones are not', () => {
    const clustered = new WatchOne(`${leak}, window: { units: 2000 }, alarms: { ${quiet} }`);
    for (let k = 0; k < 8; k += 1) clustered.take(good(200), bad(4));
    expect(clustered.watch.evidence.warnings()).toEqual([expect.stringMatching(/clusters.*Remedy/)]);
    const scattered = new WatchOne(`${leak}, window: { units: 2000 }, alarms: { ${quiet} }`);
    for (let k = 0; k < 32; k += 1) scattered.take(good(10 + ((k * 37) % 90)), bad(1));
    expect(scattered.watch.evidence.warnings()).toEqual([]);
  });
});

describe('stretches of a window that differ more than chance would have it', () => {
  const uneven = [...Array(20).keys()].map((stretch) => (stretch % 4 === 0 ? 5 : 0));

  it.each([
    ['units', '{ units: 2500 }'],
    ['time', '{ time: 50 min, step: 125 s }'],
  ])('are said in a window of %s, even ones are not', (_kind, window) => {
    const take = (one: WatchOne, counts: readonly number[]): WatchOne => {
      for (const count of counts) for (let part = 0; part < 5; part += 1) one.take(...(part < count ? [good(24), bad(1)] : [good(25)]));
      return one;
    };
    const told = (counts: readonly number[]): readonly string[] => take(new WatchOne(`${leak}, window: ${window}, alarms: { ${quiet} }`), counts).watch.evidence.warnings();
    expect(told(uneven)).toEqual([expect.stringMatching(/clusters, or their rate changed within the window: \d+ stretches of it differ .* Remedy/)]);
    expect(told(uneven.map((_, stretch) => Number(stretch % 2 === 0)))).toEqual([]);
  });

  it('are not said where clusters are declared', () => {
    const one = new WatchOne(`${leak}, window: { time: 50 min, step: 125 s }, clusters: { design-effect: 2, source: history }, alarms: { ${quiet} }`);
    for (const count of uneven) for (let part = 0; part < 5; part += 1) one.take(...(part < count ? [good(24), bad(1)] : [good(25)]));
    expect(one.watch.evidence.warnings()).toEqual([]);
  });
});

describe('records of another kind than an evidence counts', () => {
  it('demonstrate nothing', () => {
    const one = new WatchOne(`${leak}, window: { units: 400 }, alarms: { ${quiet} }`);
    one.take({ ...fills(near(251, 500, 2)), origin: good(1).kind === 'verdicts' ? { station: 'A.leak', product: 'BH-4', characteristic: 'tightness', lot: undefined } : undefined } as never);
    expect([one.state, one.watch.evidence.figures()['inspected']]).toEqual(['gathering', 0]);
  });
});

describe('one unit cannot make an alarm chatter', () => {
  const rules = `alarms: { crossing: { return: { distance: 0.1 } }, violation: off, ${quiet} }`;
  const cases: readonly [name: string, make: () => WatchOne, before: (one: WatchOne) => void, ill: () => Parameters<WatchOne['take']>[0], well: () => Parameters<WatchOne['take']>[0]][] = [
    ['nonconforming fraction', () => new WatchOne(`${leak}, window: run, ${rules}`), (one) => one.take(good(114)), () => bad(1), () => good(79)],
    ['rate', () => new WatchOne(`station: A.cutting, characteristic: surface, quantity: rate, at-most: 4 per 100 m, confidence: 90 %, window: run, ${rules}`), (one) => one.take(cuts([0], [58])), () => cuts([1], [0.1]), () => cuts([0], [39.3])],
    ['mean', () => new WatchOne(`${fill}, sigma: { value: 1 ml, source: study }, window: run, ${rules}`), (one) => one.take(fills(Array.from({ length: 100 }, () => 250.165))), () => fills([249]), () => fills([251.5])],
  ];

  it.each(cases)('on a %s: the bound must come back by the distance', (_name, make, before, ill, well) => {
    const one = make();
    before(one);
    expect(one.state).toBe('demonstrated');
    expect(one.take(ill())).toEqual({ raised: 1, again: 0, returned: 0 });
    // Demonstrated again, but only just: the alarm stays.
    expect([one.take(well()), one.state]).toEqual([{ raised: 0, again: 0, returned: 0 }, 'demonstrated']);
  });
});
