import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import type { Guarantee } from '../../../core/plant/guarantee.ts';
import type { PlantFault } from '../../../core/plant/plant-fault.ts';
import { readPlant } from '../../../core/plant/read-plant.ts';
import { guaranteeLine, leak, smallPlant } from './small-plant.ts';

function faultsIn(text: string): readonly PlantFault[] {
  const read = readPlant(text, 'v1');
  return read.ok ? [] : read.fault;
}

function guaranteeIn(guarantee: string): Guarantee {
  const read = readPlant(smallPlant(guarantee), 'v1');
  if (!read.ok) throw new Error(read.fault.map(({ sentence }) => sentence).join('\n'));
  return read.value.plant.guarantees[0]!;
}

const changed = (from: string, to: string): string => {
  expect(leak).toContain(from);
  return leak.replace(from, to);
};

describe('a sound plant file', () => {
  it('is read with its defaults', () => {
    expect(guaranteeIn(leak)).toEqual({
      id: 'leak-A',
      name: 'leak-A',
      line: 'A',
      stations: ['A.leak'],
      product: undefined,
      characteristics: ['tightness'],
      promise: { quantity: 'nonconforming-fraction', atMost: 0.0002, target: 0 },
      tail: 0.05,
      window: { kind: 'units', units: 20000 },
      looks: 'one look',
      normalRate: 0.00005,
      safetyRelevant: false,
      rules: [
        { kind: 'crossing', priority: 'medium', response: '', return: { distance: 0.1, units: 0 } },
        { kind: 'violation', priority: 'high', response: '', tail: 0.001, return: { distance: 0.1, units: 0 } },
        { kind: 'deterioration', priority: 'medium', response: '', unitsBetweenFalseCalls: 5_000_000, baseline: 'line', detector: 'mixture' },
        { kind: 'silence', priority: 'medium', response: '', afterMs: 300_000 },
        { kind: 'bad-data', priority: 'low', response: '', moreThan: 10, withinMs: 600_000 },
      ],
    });
  });

  it('carries the version it was given', () => {
    const read = readPlant(smallPlant(leak), 'abc');
    expect(read.ok && read.value.version).toBe('abc');
  });

  it('means the same as JSON, indented by tabs too', () => {
    const yaml = readPlant(smallPlant(leak), 'v1');
    const asJson = JSON.stringify(parse(smallPlant(leak)), undefined, '\t');
    expect(readPlant(asJson, 'v1')).toEqual(yaml);
  });

  it('keeps a yield exact: 98.5 % leaves the double nearest to 0.015', () => {
    const { promise, normalRate } = guaranteeIn(`id: y\nquantity: yield\nstation: A.final\ncharacteristic: finish\nat-least: 98.5 %\nnormal-rate: 99.3 %\nwindow: shift`);
    expect(promise).toEqual({ quantity: 'yield', atLeast: 0.985, target: 1, atMostNonconforming: 0.015 });
    expect(normalRate).toBe(0.993);
  });

  it('keeps a confidence level as its exact tail', () => {
    expect(guaranteeIn(`${changed('20000', '200000')}\nconfidence: 99.9999 %`).tail).toBe(1e-6);
    expect(guaranteeIn(`${leak}\nconfidence: 0.9`).tail).toBe(0.1);
    // the violation rule is never laxer than the bound itself
    expect(guaranteeIn(`${changed('20000', '200000')}\nconfidence: 99.99 %`).rules[1]).toMatchObject({ kind: 'violation', tail: 0.0001 });
  });

  it('reads the other quantities', () => {
    expect(guaranteeIn('id: r\nquantity: rate\nstation: A.crimp\ncharacteristic: finish\nat-most: 2 per 100 m\nwindow: run').promise)
      .toEqual({ quantity: 'rate', atMost: 2, per: 100, unit: 'm', target: 0 });
    expect(guaranteeIn('id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400 N\ntarget: 450\nrange: { from: 0, to: 900 N }\nwindow: lot').promise)
      .toEqual({ quantity: 'mean', side: 'at-least', line: 400, target: 450, unit: 'N', sigma: undefined, range: { from: 0, to: 900 } });
    expect(guaranteeIn('id: f\nquantity: fraction-beyond-limit\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nspecification-limit: { below: 400 }\nat-most: 1 %\nwindow: { time: 8 h }'))
      .toMatchObject({ promise: { limit: { side: 'below', value: 400 }, unit: 'N', model: 'counted' }, window: { kind: 'time', spanMs: 28_800_000, stepMs: 480_000 } });
    expect(guaranteeIn('id: c\nquantity: chained-yield\nstations: [A.crimp, A.final]\ncharacteristics: [finish, finish]\nat-least: 97 %\nwindow: { units: 99 }'))
      .toMatchObject({ line: 'A', stations: ['A.crimp', 'A.final'], promise: { atLeast: 0.97, target: 1 } });
    expect(guaranteeIn('id: l\nquantity: lot-fraction\nstation: A.final\ncharacteristic: finish\nat-most: 1 %').window).toEqual({ kind: 'lot' });
  });

  it('proposes a window from the normal rate', () => {
    expect(guaranteeIn(changed('window: { units: 20000 }', ''))).toMatchObject({ window: { kind: 'units', units: 78523 } });
  });

  it('asks for units where no faultless window could bring the bound back by the usual distance', () => {
    expect(guaranteeIn(changed('20000', '15000')).rules[0]).toMatchObject({ return: { distance: 0, units: 750 } });
  });

  it('switches rules on and off, and raises what a safety-relevant guarantee needs', () => {
    const { rules } = guaranteeIn(`${leak}\nsafety-relevant: true\nalarms:\n  crossing: off\n  deterioration: { units-between-false-calls: 1000000, baseline: normal-rate }\n  violation: { confidence: 99 %, response: Stop. }`);
    expect(rules.map(({ kind, priority }) => `${kind} ${priority}`)).toEqual(['violation high', 'deterioration medium', 'silence high', 'bad-data medium']);
    expect(rules[0]).toMatchObject({ tail: 0.01, response: 'Stop.' });
  });

  it('reads the demo plant, which has every quantity', () => {
    const read = readPlant(readFileSync(new URL('../../../server/demo/hose-works.yaml', import.meta.url), 'utf8'), 'v1');
    expect(read.ok ? [] : read.fault).toEqual([]);
    if (!read.ok) return;
    const { guarantees, shifts } = read.value.plant;
    expect(new Set(guarantees.map(({ promise }) => promise.quantity)).size).toBe(7);
    expect(shifts.map(({ name }) => name)).toEqual(['Early', 'Late', 'Night']);
    for (const { normalRate, rules } of guarantees) {
      expect(normalRate).toBeDefined();
      for (const { kind, response } of rules) if (kind !== 'bad-data') expect(response.length).toBeGreaterThan(20);
    }
  });
});

const at = (offset: number): number => guaranteeLine + offset;

/** Guarantee, then line, field and a part of the sentence of its only fault. */
const badGuarantees: readonly (readonly [guarantee: () => string, line: number, field: string, says: string])[] = [
  [() => changed('200 ppm', 'two hundred ppm'), at(4), 'guarantees[0].at-most', "'two hundred ppm' does not fit; expected a share, e.g. 200 ppm, 0.02 %, 1 in 5000 or a number from 0 to 1."],
  [() => changed('at-most: 200 ppm\n', ''), at(0), 'guarantees[0].at-most', 'is missing; expected a share'],
  [() => changed('at-most: 200 ppm', 'at-most: 0'), at(4), 'guarantees[0].at-most', 'no evidence can demonstrate 0'],
  [() => changed('at-most: 200 ppm', 'at-most:'), at(4), 'guarantees[0].at-most', 'nothing does not fit'],
  [() => changed('at-most: 200 ppm', 'at-most: [200 ppm]'), at(4), 'guarantees[0].at-most', 'a list does not fit'],
  [() => `${leak}\natt-most: 3 %`, at(7), 'guarantees[0].att-most', "no such field here (did you mean 'at-most'?)"],
  [() => `${leak}\nat-most: 3 %`, at(7), 'guarantees[0].at-most', 'a second time'],
  [() => changed('nonconforming-fraction', 'nonconforming-fractoin'), at(1), 'guarantees[0].quantity', "did you mean 'nonconforming-fraction'?"],
  [() => changed('quantity: nonconforming-fraction\n', ''), at(0), 'guarantees[0].quantity', 'is missing; expected one of'],
  [() => changed('A.leak', 'A.laek'), at(2), 'guarantees[0].station', "did you mean 'A.leak'?"],
  [() => changed('tightness', 'tightnes'), at(3), 'guarantees[0].characteristic', "did you mean 'tightness'?"],
  [() => `${leak}\nproduct: BH-6`, at(7), 'guarantees[0].product', 'expected the id of a product: BH-4, BH-5'],
  [() => changed('tightness', 'finish').concat('\nproduct: BH-5'), at(3), 'guarantees[0].characteristic', 'a characteristic of BH-5'],
  [() => `${leak}\ntarget: 200 ppm`, at(7), 'guarantees[0].target', 'a target below the guarantee line'],
  [() => changed('50 ppm', '200 ppm'), at(5), 'guarantees[0].normal-rate', 'a normal rate below the guarantee line'],
  // ln(0.05) / ln(1 - 0.0002) = 14977.16…, computed by hand with 20 digits
  [() => changed('20000', '14977'), at(6), 'guarantees[0].window.units', '14977 does not fit; expected at least 14978 units'],
  [() => changed('20000', '0'), at(6), 'guarantees[0].window.units', 'whole units, 1 to 1000000000'],
  [() => changed('{ units: 20000 }', 'shfit'), at(6), 'guarantees[0].window', "did you mean 'shift'?"],
  [() => changed('{ units: 20000 }', '{ time: 8 h, step: 7 min }'), at(6), 'guarantees[0].window.step', 'a step that divides'],
  [() => changed('{ units: 20000 }', '{ time: 8 hours }'), at(6), 'guarantees[0].window.time', 'a duration in whole milliseconds'],
  [() => changed('normal-rate: 50 ppm\nwindow: { units: 20000 }', 'safety-relevant: false'), at(0), 'guarantees[0].window', 'or a normal-rate from which one is proposed'],
  [() => changed('50 ppm\nwindow: { units: 20000 }', '199.999 ppm'), at(5), 'guarantees[0].normal-rate', 'farther from the guarantee line'],
  [() => `${leak}\nconfidence: 100 %`, at(7), 'guarantees[0].confidence', 'below 100 %'],
  [() => `${leak}\nconfidence: 5 %`, at(7), 'guarantees[0].confidence', 'at least 50 %'],
  [() => `${leak}\nalarms: { violation: { confidence: 90 % } }`, at(7), 'guarantees[0].alarms.violation.confidence', 'not below that of the guarantee'],
  [() => `${leak}\nsafety-relevant: yes`, at(7), 'guarantees[0].safety-relevant', 'true or false'],
  [() => `${leak}\nsafety-relevant: true\nalarms:\n  silence: off`, at(9), 'guarantees[0].alarms.silence', 'lost data counts as trouble'],
  [() => `${leak}\nalarms:\n  crossing: { return: { distance: 0 } }`, at(8), 'guarantees[0].alarms.crossing.return', 'one unit could make the alarm chatter'],
  [() => `${leak}\nalarms:\n  crossing: { return: { distance: 0.5 } }`, at(8), 'guarantees[0].alarms.crossing.return.distance', 'at most 0.25'],
  [() => `${leak}\nalarms:\n  silence: { after: 0 s }`, at(8), 'guarantees[0].alarms.silence.after', 'a duration'],
  [() => `${leak}\nalarms:\n  silence: sometimes`, at(8), 'guarantees[0].alarms.silence', 'one of off'],
  [() => `${leak}\nalarms:\n  crosing: off`, at(8), 'guarantees[0].alarms.crosing', "did you mean 'crossing'?"],
  [() => changed('normal-rate: 50 ppm', 'alarms: { deterioration: { units-between-false-calls: 1000, baseline: normal-rate } }'), at(5), 'guarantees[0].alarms.deterioration.baseline', 'a normal-rate in the guarantee'],
  [() => 'id: r\nquantity: rate\nstation: A.crimp\ncharacteristic: finish\nat-most: 2 per 100 m\ntarget: 1 per m\nwindow: run', at(5), 'guarantees[0].target', 'per 100 m, as the guarantee line has'],
  [() => 'id: r\nquantity: rate\nstation: A.crimp\ncharacteristic: finish\nat-most: 2 per 100 m', at(0), 'guarantees[0].window', 'expected a window'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: 390\nwindow: run', at(6), 'guarantees[0].target', 'a target above the guarantee line'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: 450 kN\nwindow: run', at(6), 'guarantees[0].target', 'a figure in N'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\ncharacteristic: force\nat-least: 400\ntarget: 450\nwindow: run', at(3), 'guarantees[0].characteristic', 'the same in every product'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\ntarget: 450\nwindow: run', at(0), 'guarantees[0].at-least', 'either at-least or at-most'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: 450\nrange: { from: 410, to: 900 }\nwindow: run', at(7), 'guarantees[0].range', 'with the guarantee line inside it'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: .nan\nwindow: run', at(6), 'guarantees[0].target', 'a finite number'],
  [() => 'id: f\nquantity: fraction-beyond-limit\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nspecification-limit: { below: 1, above: 2 }\nat-most: 1 %\nwindow: run', at(5), 'guarantees[0].specification-limit', 'either below'],
  [() => 'id: c\nquantity: chained-yield\nstations: [A.final, A.crimp]\ncharacteristics: [finish, finish]\nat-least: 97 %\nwindow: run', at(2), 'guarantees[0].stations[1]', 'in the order the units pass them'],
  [() => 'id: c\nquantity: chained-yield\nstations: [A.crimp, B.leak]\ncharacteristics: [finish, tightness]\nat-least: 97 %\nwindow: run', at(2), 'guarantees[0].stations[1]', 'stations of one line'],
  [() => 'id: c\nquantity: chained-yield\nstations: [A.crimp, A.final]\ncharacteristics: [finish, finish, finish]\nat-least: 97 %\nwindow: run', at(3), 'guarantees[0].characteristics', 'one characteristic for each station'],
  [() => 'id: c\nquantity: chained-yield\nstations: [A.crimp, A.final]\ncharacteristics: [finish, finish]\nat-least: 97 %\nwindow: { units: 98 }', at(5), 'guarantees[0].window.units', 'at least 99 units'],
  [() => 'id: l\nquantity: lot-fraction\nstation: A.final\ncharacteristic: finish\nat-most: 1 %\nwindow: run', at(5), 'guarantees[0].window', 'a lot fraction is about one lot'],
  [() => 'id: y\nquantity: yield\nstation: A.final\ncharacteristic: finish\nat-least: 98.5 %\nwindow: shift\ntarget: 98.5 %', at(6), 'guarantees[0].target', 'a target above the guarantee line'],
  [() => 'id: y\nquantity: yield\nstation: A.final\ncharacteristic: finish\nat-least: 98.5 %\nwindow: shift\nnormal-rate: 98.5 %', at(6), 'guarantees[0].normal-rate', 'a normal rate above the guarantee line'],
  [() => 'id: y\nquantity: yield\nstation: A.final\ncharacteristic: finish\nat-least: 98.5 %\nwindow: shift'.replace('98.5', '100'), at(4), 'guarantees[0].at-least', 'no evidence can demonstrate 100 %'],
  [() => 'id: r\nquantity: rate\nstation: A.crimp\ncharacteristic: finish\nat-most: 2 per 100 m\nwindow: run\ntarget: 2 per 100 m', at(6), 'guarantees[0].target', 'a target below the guarantee line'],
  [() => 'id: r\nquantity: rate\nstation: A.crimp\ncharacteristic: finish\nat-most: 2 per 100 m\nwindow: run\nnormal-rate: 2 per 100 m', at(6), 'guarantees[0].normal-rate', 'a normal rate below the guarantee line'],
  [() => 'id: r\nquantity: rate\nstation: A.crimp\ncharacteristic: finish\nat-most: 2 per 100 m\nwindow: run'.replace('2 per', '0 per'), at(4), 'guarantees[0].at-most', 'an amount above 0'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: 450\nwindow: run\nnormal-rate: 400', at(8), 'guarantees[0].normal-rate', 'a mean of the well line above'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: 450\nwindow: run\nsigma: { value: 0, source: study }', at(8), 'guarantees[0].sigma.value', 'a standard deviation above 0'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: 450\nwindow: run\nsigma: { value: 9, source: study }\nrange: { from: 0, to: 900 }', at(8), 'guarantees[0].sigma', 'either sigma or range'],
  [() => 'id: m\nquantity: mean\nstation: A.crimp\nproduct: BH-4\ncharacteristic: force\nat-least: 400\ntarget: 450\nwindow: run'.replace('force', 'finish'), at(4), 'guarantees[0].characteristic', 'with a unit of measure'],
  [() => `${leak}\nsafety-relevant: true\nalarms:\n  bad-data: off`, at(9), 'guarantees[0].alarms.bad-data', 'lost data counts as trouble'],
  [() => `${leak}\ninspection-error: { sensitivity: 1 %, false-reject: 2 %, source: study }`, at(7), 'guarantees[0].inspection-error.sensitivity', 'tells nothing'],
  [() => `${leak}\ninspection-error: { sensitivity: 99 %, false-reject: 0.1 % }`, at(7), 'guarantees[0].inspection-error.source', 'where the figure is known from'],
  [() => `${leak}\ninspection-error: { seeded: 10, caught: 11, good: 10, rejected-good: 0 }`, at(7), 'guarantees[0].inspection-error.caught', 'at most 10'],
  [() => `${leak}\ninspection-error: { seeded: 10, caught: 2, good: 10, rejected-good: 5 }`, at(7), 'guarantees[0].inspection-error', 'try more units'],
  [() => `${leak}\nclusters: { design-effect: 0.5, source: history }`, at(7), 'guarantees[0].clusters.design-effect', 'a number, 1 to'],
  [() => `${leak}\nclusters: { merge-within: 5, cluster-size: 2, source: history }`.replace('{ units: 20000 }', '{ time: 8 h }'), at(7), 'guarantees[0].clusters.merge-within', 'does not keep where its units stood'],
  [() => `${leak}\nclusters: { lots-with-more-than: 2 }`.replace('{ units: 20000 }', 'shift'), at(7), 'guarantees[0].clusters.lots-with-more-than', 'which are whole lots'],
  [() => `${leak}\nclusters: { merge-within: 5, source: history }`, at(7), 'guarantees[0].clusters.cluster-size', 'a number, 1 to'],
  [() => `${leak.replace('20000', '90000')}\nclusters: { design-effect: 2, source: history }\nalarms: { deterioration: { units-between-false-calls: 1000000 } }`, at(8), 'guarantees[0].alarms.deterioration', 'merge-within'],
  [() => `${leak}\nclusters: { design-effect: 2, source: history }`, at(6), 'guarantees[0].window.units', 'at least'],
  [() => `${leak.replace('20000', '90000')}\ninspection-error: { sensitivity: 99 %, false-reject: 0, source: study }\nclusters: { design-effect: 2, source: history }`, at(8), 'guarantees[0].clusters', 'corrects for both'],
  [() => 'id: l\nquantity: lot-fraction\nstation: A.final\ncharacteristic: finish\nat-most: 1 %\nclusters: { design-effect: 2, source: history }', at(5), 'guarantees[0].clusters', 'there is no'],
  [() => `${leak}\nconstructor: 1`, at(0), 'guarantees[0]', 'plain words'],
  [() => `${leak}\n__proto__: 1`, at(0), 'guarantees[0]', 'plain words'],
];

describe('a faulty guarantee', () => {
  it.each(badGuarantees.map(([guarantee, ...rest]) => [rest[2], ...rest, guarantee] as const))('%s', (_title, line, field, says, guarantee) => {
    const faults = faultsIn(smallPlant(guarantee()));
    expect(faults.map((fault) => [fault.line, fault.field])).toEqual([[line, field]]);
    expect(faults[0]!.sentence).toContain(says);
    expect(faults[0]!.sentence).toContain(`${field} (line ${line}): `);
  });
});

describe('many faults', () => {
  it('are told all at once, in file order, form and meaning alike', () => {
    const second = leak.replace('leak-A', 'leak-A').replace('50 ppm', '300 ppm');
    const text = `${smallPlant(changed('200 ppm', 'few'))}  - ${second.split('\n').join('\n    ')}\nextra: 1\n`.replace('Europe/Copenhagen', 'Europe/Kopenhagen');
    expect(faultsIn(text).map(({ line, column, field }) => [line, column, field])).toEqual([
      [2, 39, 'plant.time-zone'],
      [at(4), 14, 'guarantees[0].at-most'],
      [at(12), 18, 'guarantees[1].normal-rate'],
      [at(14), 1, 'extra'],
    ]);
  });

  it('a misspelt field that must be there is told twice: as unknown and as missing', () => {
    const faults = faultsIn(smallPlant(changed('units: 20000', 'unit: 20000')));
    expect(faults.map(({ field }) => field).sort()).toEqual(['guarantees[0].window.unit', 'guarantees[0].window.units']);
    expect(faults.map(({ sentence }) => sentence).join()).toContain("did you mean 'units'?");
  });

  it('a faulty list of lines does not make its stations look unknown', () => {
    expect(faultsIn(smallPlant(leak).replace('id: B\n', 'id: B B\n')).map(({ field }) => field)).toEqual(['lines[1].id']);
  });

  it('are cut at two hundred, and the rest is counted', () => {
    const faults = faultsIn(smallPlant(leak).concat(Array.from({ length: 300 }, (_, n) => `x${n}: 1\n`).join('')));
    expect(faults.length).toBe(201);
    expect(faults.at(-1)!.sentence).toBe('The file has 100 faults more; mend these first.');
  });
});

const shifts = (text: string): string => `shifts:\n${text}`;

/** Head of the file or a change of it, then line, field and a part of the sentence. */
const badPlants: readonly (readonly [text: () => string, line: number, field: string, says: string])[] = [
  [() => smallPlant(leak).replace('vouchline: 1', 'vouchline: 2'), 1, 'vouchline', '2 does not fit; expected 1, the version'],
  [() => smallPlant(leak).replace('Europe/Copenhagen', '"+01:00"'), 2, 'plant.time-zone', 'an IANA time zone name'],
  [() => smallPlant(leak).replace('id: B\n', 'id: A\n'), 6, 'lines[1].id', 'no other line'],
  [() => smallPlant(leak).replace('id: B.leak', 'id: A.leak'), 7, 'lines[1].stations[1].id', 'no other station of the plant'],
  [() => smallPlant(leak).replace('id: BH-5', 'id: BH-4'), 11, 'products[1].id', 'no other product'],
  [() => smallPlant(leak).replace('{ id: finish }', '{ id: tightness }'), 10, 'products[0].characteristics[2].id', 'no other characteristic'],
  [() => `${smallPlant(leak)}  - ${leak.split('\n').join('\n    ')}`, at(7), 'guarantees[1].id', 'no other guarantee'],
  [() => smallPlant(leak, shifts('  - { name: a, from: 06:00, to: "14:00" }\n  - { name: b, from: "13:59", to: "22:00" }\n')), 5, 'shifts[1].from', "does not overlap 'a'"],
  [() => smallPlant(leak, shifts('  - { name: a, from: "14:00", to: "22:00" }\n  - { name: b, from: "06:00", to: "14:01" }\n')), 5, 'shifts[1].from', "does not overlap 'a'"],
  [() => smallPlant(leak, shifts('  - { name: a, days: Sun, from: "22:00", to: "06:00" }\n  - { name: b, days: Mon, from: "05:00", to: "07:00" }\n')), 5, 'shifts[1].from', "does not overlap 'a'"],
  [() => smallPlant(leak, shifts('  - { name: a, from: "06:00", to: "14:00" }\n  - { name: a, from: "14:00", to: "22:00" }\n')), 5, 'shifts[1].name', 'no other shift'],
  [() => smallPlant(leak, shifts('  - { name: a, days: [Mon, Mon], from: "06:00", to: "14:00" }\n')), 4, 'shifts[0].days', 'each weekday once'],
  [() => smallPlant(leak, shifts('  - { name: a, days: [Mon, Tues], from: "06:00", to: "14:00" }\n')), 4, 'shifts[0].days[1]', "did you mean 'Tue'?"],
  [() => smallPlant(leak, shifts('  - { name: a, days: Mo-Fr, from: "06:00", to: "14:00" }\n')), 4, 'shifts[0].days', 'Mon-Fri'],
  [() => smallPlant(leak, shifts('  - { name: a, from: "24:00", to: "14:00" }\n')), 4, 'shifts[0].from', 'a time of day in quotes'],
  [() => smallPlant(leak, shifts('  - { name: a, from: 6, to: "14:00" }\n')), 4, 'shifts[0].from', '6 does not fit'],
];

describe('a faulty plant', () => {
  it.each(badPlants.map(([text, ...rest]) => [rest[1], ...rest, text] as const))('%s', (_title, line, field, says, text) => {
    const faults = faultsIn(text());
    expect(faults.map((fault) => [fault.line, fault.field])).toEqual([[line, field]]);
    expect(faults[0]!.sentence).toContain(says);
  });

  it('shifts that follow each other around the week do not overlap', () => {
    const text = smallPlant(leak, shifts('  - { name: a, from: "06:00", to: "14:00" }\n  - { name: b, days: Fri-Mon, from: "14:00", to: "22:00" }\n  - { name: c, from: "22:00", to: "06:00" }\n'));
    const read = readPlant(text, 'v1');
    expect(read.ok && read.value.plant.shifts.map(({ days, fromMinute, toMinute }) => [days, fromMinute, toMinute])).toEqual([
      [[1, 2, 3, 4, 5, 6, 7], 360, 840],
      [[5, 6, 7, 1], 840, 1320],
      [[1, 2, 3, 4, 5, 6, 7], 1320, 360],
    ]);
  });
});
