import { describe, expect, it } from 'vitest';
import { readPlant } from '../../../core/plant/read-plant.ts';
import { routesFor, routesOf } from '../../../core/plant/routes.ts';
import { leak, smallPlant } from './small-plant.ts';

describe('routes of records to guarantees', () => {
  const more = ['id: chain\nquantity: chained-yield\nstations: [A.leak, A.final]\ncharacteristics: [tightness, finish]\nat-least: 97 %\nwindow: run', leak.replace('leak-A', 'leak-A-5').concat('\nproduct: BH-5')];
  const text = smallPlant(leak) + more.map((one) => `  - ${one.split('\n').join('\n    ')}\n`).join('');
  const read = readPlant(text, 'v');
  if (!read.ok) throw new Error(read.fault[0]!.sentence);
  const routes = routesOf(read.value.plant);
  const taken = (station: string, characteristic: string, product: string): (readonly [number, number])[] =>
    routesFor(routes, { station, characteristic, product, lot: undefined }).map((route) => [route.guarantee, route.station]);

  it('go by station, characteristic and product', () => {
    expect(taken('A.leak', 'tightness', 'BH-4')).toEqual([[0, 0], [1, 0]]);
    expect(taken('A.leak', 'tightness', 'BH-5')).toEqual([[0, 0], [1, 0], [2, 0]]);
    expect(taken('A.final', 'finish', 'BH-5')).toEqual([[1, 1]]);
  });

  it('lead nowhere for what nobody promised', () => {
    expect(taken('B.leak', 'tightness', 'BH-4')).toEqual([]);
    expect(taken('A.leak', 'finish', 'BH-4')).toEqual([]);
  });
});
