import fc from 'fast-check';
import type { Monitor } from '../../../core/monitor/monitor.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import { readPlant } from '../../../core/plant/read-plant.ts';
import type { Plant } from '../../../core/plant/plant.ts';
import { frameOf } from '../../../core/record/frame-of.ts';
import { tailOf } from '../../../core/record/tail-of.ts';
import type { InspectionPart, Origin, Part } from '../../../core/record/part.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';

/** A Monday morning, 08:00 in the plant's zone. */
export const monday = Date.UTC(2026, 5, 1, 6, 0, 0);

const windows = { last: '{ units: 300 }', time: '{ time: 30 min, step: 5 min }', fine: '{ time: 90 s, step: 10 s }', run: 'run' } as const;
type WindowName = keyof typeof windows;

const quantities: Readonly<Record<string, string>> = {
  leak: 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 2 %',
  yield: 'station: A.leak, characteristic: tightness, quantity: yield, at-least: 96 %',
  erring: 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 2 %, inspection-error: { sensitivity: 90 %, false-reject: 0.5 %, source: gauge study of May }',
  tried: 'station: A.leak, characteristic: tightness, quantity: yield, at-least: 90 %, inspection-error: { seeded: 200, caught: 190, good: 400, rejected-good: 1 }',
  designed: 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 4 %, clusters: { design-effect: 1.7, source: three months of crimping }',
  events: 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 4 %, clusters: { merge-within: 6, cluster-size: 1.5, source: three months of crimping }',
  lots: 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 40 %, clusters: { lots-with-more-than: 3 }',
  cusum: 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 2 %',
  leakAll: 'station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 4 %, looks: all',
  yieldBoth: 'station: A.leak, characteristic: tightness, quantity: yield, at-least: 96 %, looks: both',
  flawsAll: 'station: A.cutting, characteristic: surface, quantity: rate, at-most: 4 per 100 m, looks: all',
  fillAll: 'station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 251 ml, looks: all',
  capAll: 'station: A.filling, characteristic: fill, quantity: mean, at-most: 251 ml, target: 250 ml, sigma: { value: 1 ml, source: scale study of May }, looks: all',
  rangeBoth: 'station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 252 ml, range: { from: 246 ml, to: 256 ml }, looks: both',
  beyondAll: 'station: A.filling, characteristic: fill, quantity: fraction-beyond-limit, specification-limit: { below: 248 ml }, at-most: 3 %, looks: all',
  flaws: 'station: A.cutting, characteristic: surface, quantity: rate, at-most: 4 per 100 m',
  fill: 'station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 251 ml',
  cap: 'station: A.filling, characteristic: fill, quantity: mean, at-most: 251 ml, target: 250 ml, sigma: { value: 1 ml, source: scale study of May }',
  range: 'station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 252 ml, range: { from: 246 ml, to: 256 ml }',
  beyond: 'station: A.filling, characteristic: fill, quantity: fraction-beyond-limit, specification-limit: { below: 248 ml }, at-most: 3 %',
  model: 'station: A.filling, characteristic: fill, quantity: fraction-beyond-limit, specification-limit: { below: 248 ml }, at-most: 3 %, model: normal',
  chain: 'stations: [A.cutting, A.leak], characteristics: [cut, tightness], quantity: chained-yield, at-least: 95 %',
};

/** Every quantity in every window, each with crossing and violation rules that return by a distance and by units. */
export function everyGuarantee(): string {
  const lines = Object.entries(quantities).flatMap(([name, what]) =>
    (Object.keys(windows) as WindowName[]).filter((window) => ((name !== 'events' && name !== 'lots') || !windows[window].includes('time')) && (!/All|Both/.test(name) || window === 'last')).map(
      (window) =>
        `  - { id: ${name}-${window}, ${what}, confidence: 90 %, window: ${windows[window]}, alarms: { crossing: { return: { distance: 0.05, units: 20 } }, violation: { confidence: 95 %, return: { distance: 0, units: 10 } }, silence: off, bad-data: off${name === 'cusum' ? ', deterioration: { detector: cusum, units-between-false-calls: 3000 }' : ''} } }`,
    ),
  );
  return [...lines, '  - { id: lot, station: A.leak, characteristic: outgoing, quantity: lot-fraction, at-most: 4 %, confidence: 90 %, alarms: { violation: { confidence: 95 % }, silence: off, bad-data: off } }'].join('\n');
}

export function plantOfText(guarantees: string): Plant {
  const reading = readPlant(
    `vouchline: 1
plant: { name: Hose works, time-zone: Europe/Copenhagen }
lines:
  - { id: A, name: Hose line A, stations: [{ id: A.cutting, name: Cutting }, { id: A.leak, name: Leak test }, { id: A.filling, name: Filling }] }
products:
  - id: BH-4
    name: Brake hose 4 mm
    characteristics: [{ id: tightness, name: T }, { id: surface, name: S }, { id: cut, name: C }, { id: outgoing, name: O }, { id: fill, name: F, unit: ml }]
guarantees:
${guarantees}
`,
    'v',
  );
  if (!reading.ok) throw new Error(reading.fault.map(({ sentence }) => sentence).join('\n'));
  return reading.value.plant;
}

const at = (station: string, characteristic: string): Origin => ({ station, product: 'BH-4', characteristic, lot: undefined });
export const origins = {
  leak: at('A.leak', 'tightness'),
  cut: at('A.cutting', 'cut'),
  outgoing: at('A.leak', 'outgoing'),
  surface: at('A.cutting', 'surface'),
  fill: at('A.filling', 'fill'),
} as const;

/** A recipe for records; the same seed makes the same ones. */
interface Recipe {
  readonly what: 'leak' | 'cut' | 'outgoing' | 'surface' | 'fill' | 'tallies' | 'correction' | 'lot';
  readonly records: number;
  readonly rate: number;
  readonly mean: number;
  readonly stepMs: number;
  readonly pauseMs: number;
  readonly seed: number;
}

export const recipes: fc.Arbitrary<Recipe[]> = fc.array(
  fc.record({
    what: fc.constantFrom('leak', 'leak', 'cut', 'outgoing', 'surface', 'fill', 'fill', 'tallies', 'correction', 'lot'),
    records: fc.integer({ min: 1, max: 150 }),
    rate: fc.constantFrom(0, 0.005, 0.03, 0.2),
    mean: fc.constantFrom(249, 250.5, 251, 252),
    stepMs: fc.constantFrom(0, 700, 4_000, 13_000),
    pauseMs: fc.constantFrom(0, 0, 0, 61_000, 2_400_000),
    seed: fc.integer({ min: 1, max: 1e6 }),
  }),
  { minLength: 1, maxLength: 30 },
);

/** The parts a list of recipes makes, times rising from part to part. */
export function partsOf(list: readonly Recipe[]): Part[] {
  const parts: Part[] = [];
  let now = monday;
  let sequence = 1;
  for (const recipe of list) {
    now += recipe.pauseMs;
    const part = partOf(recipe, now, sequence);
    parts.push(part);
    sequence += part.records;
    now += part.records * recipe.stepMs;
  }
  return parts;
}

function partOf(recipe: Recipe, now: number, sequence: number): Part {
  const { what, records, rate, mean, stepMs, seed } = recipe;
  const uniform = seededUniform(seed);
  const each = <T>(make: () => T): T[] => Array.from({ length: records }, make);
  const common = { records, time: { kind: 'steady', start: now, step: stepMs } } as const;
  switch (what) {
    case 'leak':
    case 'cut':
    case 'outgoing':
      return { ...common, kind: 'verdicts', origin: origins[what], nonconforming: Uint32Array.from(each(uniform).flatMap((u, place) => (u < rate ? [place] : []))) };
    case 'tallies': {
      const inspected = Uint32Array.from(each(() => 1 + Math.floor(uniform() * 4)));
      return { ...common, kind: 'tallies', origin: origins.leak, inspected, nonconforming: inspected.map((units) => (uniform() < rate * units ? 1 : 0)) };
    }
    case 'surface': {
      const exposure = Float64Array.from(each(() => 0.5 + uniform()));
      return { ...common, kind: 'exposures', origin: origins.surface, exposure, count: Uint32Array.from(exposure, () => (uniform() < rate ? 1 : 0)) };
    }
    case 'fill':
      // Twelve uniforms add up to nearly normal values with a standard deviation of 1.
      return { ...common, kind: 'measurements', origin: origins.fill, value: Float64Array.from(each(() => mean - 6 + Array.from({ length: 12 }, uniform).reduce((a, b) => a + b))) };
    case 'correction':
      return { kind: 'correction', records: 1, origin: origins.leak, at: now, corrects: Math.max(1, sequence - records), finding: { kind: 'verdict', nonconforming: rate > 0.02 }, reason: 'inspected again' };
    case 'lot':
      return { kind: 'lot-start', records: 1, at: now, line: 'A', product: 'BH-4', lot: `L-${seed % 5}`, size: seed % 3 === 0 ? undefined : 50 + (seed % 400) };
  }
}

/** Cuts every part of records into pieces of at most `most` records. */
export function pieces(parts: readonly Part[], most: number): Part[] {
  return parts.flatMap((part) => {
    if (!('time' in part)) return [part];
    const cut: Part[] = [];
    for (let from = 0; from < part.records; from += most) cut.push(headOf(tailOf(frameOf(1, [part]), from).parts[0] as InspectionPart, most));
    return cut;
  });
}

function headOf(part: InspectionPart, most: number): InspectionPart {
  const records = Math.min(most, part.records);
  const time = part.time.kind === 'each' ? { ...part.time, times: part.time.times.subarray(0, records) } : part.time;
  switch (part.kind) {
    case 'verdicts':
      return { ...part, records, time, nonconforming: part.nonconforming.filter((place) => place < records) };
    case 'tallies':
      return { ...part, records, time, inspected: part.inspected.subarray(0, records), nonconforming: part.nonconforming.subarray(0, records) };
    case 'exposures':
      return { ...part, records, time, count: part.count.subarray(0, records), exposure: part.exposure.subarray(0, records) };
    case 'measurements':
      return { ...part, records, time, value: part.value.subarray(0, records) };
  }
}

export interface Run {
  readonly happenings: readonly Happening[];
  readonly next: number;
}

/** Hands parts to a monitor whose clock follows the records. */
export function feed(monitor: Monitor, parts: readonly Part[], partsAFrame: number, first = 1): Run {
  let next = first;
  for (let k = 0; k < parts.length; k += partsAFrame) {
    const frame = frameOf(next, parts.slice(k, k + partsAFrame));
    if (monitor.takeFrame('tester', frame, undefined).kind !== 'taken') throw new Error('a frame was not taken');
    next += frame.records;
  }
  return { happenings: monitor.decisions().happenings.filter(({ kind }) => kind !== 'set-aside'), next };
}
