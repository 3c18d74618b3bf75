import type { Alarm } from '../../core/alarm/alarm.ts';
import type { LiveSnapshot } from '../../core/live/message.ts';
import type { GuaranteeCard, GuaranteeView } from '../../core/view/guarantee-view.ts';
import type { RunView } from '../../core/view/run-view.ts';

/** Tuesday 3 March 2026, 09:12 in Vienna, during the early shift. */
export const plantStart = Date.UTC(2026, 2, 3, 8, 12);

const minute = 60_000;
const binomial: GuaranteeCard['method'] = {
  name: 'Exact binomial bound',
  sentence: 'The largest nonconforming fraction at which seeing this few nonconforming units would still happen with probability 5 %.',
  assumes: ['Units are independent of one another.', 'The nonconforming fraction does not change within the window.'],
  source: 'C. J. Clopper, E. S. Pearson, Biometrika 26 (1934), pp. 404-413',
};
const student: GuaranteeCard['method'] = {
  name: 'Student t bound of the mean',
  sentence: 'The smallest mean at which a sample mean this high would still happen with probability 5 %.',
  assumes: ['Values are independent.', 'Values are about normal, or there are many of them.'],
  source: 'ISO 2854:1976, table A',
};

const cardBase: GuaranteeCard = {
  id: '', name: '', line: 'a', lineName: 'Hose line A', stationNames: ['Leak test'], product: 'bh-4', productName: 'Hose BH-4',
  characteristicName: 'seal integrity', quantity: 'nonconforming-fraction', side: 'at-most', scale: { kind: 'share' },
  guaranteeLine: 200e-6, target: 0, confidence: '0.95', tail: 0.05, window: { kind: 'units', units: 50_000 }, looks: 'one look',
  safetyRelevant: false, specificationLimit: undefined, method: binomial,
};

const fakeRun: RunView = {
  number: 3, cause: 'restart', detail: 'die changed (Ines Maurer)', begunAt: plantStart - 355 * minute, decides: 'nothing', kept: 2.6, broken: -1.1, enoughKept: 1.301, enoughBroken: 3, bound: 171e-6, opposite: 12e-6,
  figures: { runUnits: 84_210, runNonconforming: 6 }, keptAt: plantStart - 140 * minute, brokenAt: undefined,
  method: { name: 'beta-mixture bound of a run', sentence: 'All rates on one side of the line are weighed against the line itself by how likely they make what was seen; the evidence is the average of these ratios.', assumes: ['The chance of nonconforming stays the same through the run.'], source: 'mixture method, H. Robbins 1970 (from memory), one-sided; own derivation' },
};

const viewBase: GuaranteeView = {
  id: '', state: 'demonstrated', remark: undefined, since: plantStart - 95 * minute, lookRule: 'one look', estimate: 60e-6, bound: 148e-6,
  oppositeBound: 20e-6, allowance: { estimate: 0.3, bound: 0.74, opposite: 0.1, trail: [0.8, 0.79, 0.78, 0.77, 0.75, 0.74] },
  figures: { inspected: 50_000, nonconforming: 3 }, margin: { canTake: 2 }, newest: plantStart - 400, drift: 'steady',
  product: 'BH-4', lot: undefined, alarmIds: [], lineRunning: true, warnings: [], detector: { kind: 'mixture', gauge: 0.34, alarmed: false, inARowToAlarm: 4, conformingToHalfWay: 0, toReturn: undefined, betweenFalseCalls: 1_000_000, baseline: 200e-6, against: 'line', doubt: undefined },
  oppositeLookRule: 'one look',
  run: fakeRun,
};

export interface FakeGuarantee {
  readonly card: GuaranteeCard;
  readonly view: GuaranteeView;
}

const guarantee = (card: Partial<GuaranteeCard> & { id: string; name: string }, view: Partial<GuaranteeView>): FakeGuarantee => ({
  card: { ...cardBase, ...card },
  view: { ...viewBase, ...view, id: card.id },
});

const lineB = { line: 'b', lineName: 'Hose line B' } as const;
const bottling = { line: 'f', lineName: 'Fluid bottling', product: 'kit-250', productName: 'Fluid kit 250 ml' } as const;

/** Eight guarantees, every quantity and every evidence state among them. */
export const eight: readonly FakeGuarantee[] = [
  guarantee({ id: 'leak-bh4', name: 'BH-4 leak test', safetyRelevant: true }, {
    state: 'violated', since: plantStart - 6 * minute, lookRule: 'all looks', estimate: 310e-6, bound: 484e-6, oppositeBound: 216e-6,
    allowance: { estimate: 1.55, bound: 2.42, opposite: 1.08, trail: [0.7, 0.71, 0.73, 0.76, 0.8, 0.9, 1.05, 1.2, 1.4, 1.6, 2, 2.42] },
    figures: { inspected: 48_210, nonconforming: 15 }, margin: { conformingToDemonstrate: 61_400 }, drift: 'rising', lot: 'L-2603-07', alarmIds: [41], oppositeLookRule: 'all looks',
    run: { ...fakeRun, decides: 'state', kept: -1.6, broken: 3.4, keptAt: undefined, brokenAt: plantStart - 6 * minute },
    detector: { kind: 'mixture', gauge: 0.82, alarmed: true, inARowToAlarm: undefined, conformingToHalfWay: 5210, toReturn: 9040, betweenFalseCalls: 1_000_000, baseline: 200e-6, against: 'line', doubt: 'Nonconforming units come in clusters now, so the distance between false calls no longer holds: it calls falsely more often. Find the common cause, or count events (clusters: merge-within) in the plant file.' },
    warnings: ['9 of the 15 nonconforming units came within 12 minutes; the window is not of one piece.'],
  }),
  guarantee({ id: 'pull-bh5', name: 'BH-5 crimp pull-off force', ...lineB, stationNames: ['Crimping'], product: 'bh-5', productName: 'Hose BH-5', characteristicName: 'pull-off force', quantity: 'fraction-beyond-limit', guaranteeLine: 300e-6, window: { kind: 'units', units: 4000 }, specificationLimit: { side: 'below', value: 1200, unit: 'N' } }, {
    state: 'undecided', since: plantStart - 19 * minute, estimate: 186e-6, bound: 336e-6, oppositeBound: 90e-6,
    allowance: { estimate: 0.62, bound: 1.12, opposite: 0.3, trail: [0.8, 0.82, 0.84, 0.88, 0.9, 0.94, 0.97, 1, 1.02, 1.05, 1.08, 1.12] },
    figures: { inspected: 4000, mean: 1381.2, sd: 51.4 }, margin: { conformingToDemonstrate: 1420 }, drift: 'rising', alarmIds: [40], product: 'BH-5',
  }),
  guarantee({ id: 'cap-torque', name: 'Kit cap torque', ...bottling, stationNames: ['Capping'], characteristicName: 'cap torque', quantity: 'fraction-beyond-limit', guaranteeLine: 500e-6, specificationLimit: { side: 'below', value: 1.4, unit: 'Nm' } }, {
    state: 'unknown', remark: 'No record for 4 min 10 s; the source cap-torque-1 is silent and the line is said to run', since: plantStart - 4 * minute,
    estimate: 165e-6, bound: 300e-6, oppositeBound: undefined, allowance: { estimate: 0.33, bound: 0.6, opposite: undefined, trail: [0.58, 0.59, 0.6] },
    figures: { inspected: 2950 }, margin: {}, newest: plantStart - 250_000, drift: undefined, alarmIds: [39], product: 'Kit 250 ml',
  }),
  guarantee({ id: 'final-bh4', name: 'BH-4 final inspection', stationNames: ['Final inspection'], characteristicName: 'all of the inspection', quantity: 'yield', side: 'at-least', guaranteeLine: 0.985, target: 0.99, window: { kind: 'time', spanMs: 8 * 60 * minute as never, stepMs: minute as never } }, {
    estimate: 0.98778, bound: 0.98631, oppositeBound: 0.9891, allowance: { estimate: 0.44, bound: 0.91, opposite: 0.2, trail: [0.7, 0.72, 0.74, 0.76, 0.79, 0.8, 0.82, 0.84, 0.86, 0.88, 0.9, 0.91] },
    figures: { inspected: 16_204, nonconforming: 198 }, margin: { canTake: 3 }, drift: 'rising',
  }),
  guarantee({ id: 'leak-bh5', name: 'BH-5 leak test', ...lineB, product: 'bh-5', productName: 'Hose BH-5', safetyRelevant: true }, { allowance: { estimate: 0.2, bound: 0.74, opposite: undefined, trail: [0.8, 0.79, 0.78, 0.77, 0.75, 0.74] }, estimate: 40e-6, product: 'BH-5' }),
  guarantee({ id: 'fill', name: 'Kit fill volume', ...bottling, stationNames: ['Filling'], characteristicName: 'fill volume', quantity: 'mean', side: 'at-least', scale: { kind: 'measure', unit: 'ml' }, guaranteeLine: 250, target: 252, window: { kind: 'units', units: 400 }, method: student, specificationLimit: { side: 'below', value: 249, unit: 'ml' } }, {
    estimate: 251.42, bound: 250.96, oppositeBound: 251.7, allowance: { estimate: 0.29, bound: 0.52, opposite: undefined, trail: [0.5, 0.53, 0.5, 0.51, 0.52, 0.52] },
    figures: { inspected: 400, mean: 251.42, sd: 1.31 }, margin: { clearance: 0.96 }, product: 'Kit 250 ml',
  }),
  guarantee({ id: 'flaws-bh4', name: 'BH-4 surface flaws', stationNames: ['Cutting'], characteristicName: 'surface flaws', quantity: 'rate', scale: { kind: 'rate', per: 100, unit: 'm' }, guaranteeLine: 2, window: { kind: 'units', units: 900 } }, {
    estimate: 0.52, bound: 0.82, oppositeBound: 0.3, allowance: { estimate: 0.26, bound: 0.41, opposite: undefined, trail: [0.44, 0.43, 0.43, 0.42, 0.41, 0.41] },
    figures: { count: 24, exposure: 4610 }, margin: { canTake: 19 }, drift: 'falling',
  }),
  guarantee({ id: 'chain-b', name: 'BH-6 crimp to final', ...lineB, stationNames: ['Crimping', 'Leak test', 'Final inspection'], product: 'bh-6', productName: 'Hose BH-6', quantity: 'chained-yield', side: 'at-least', guaranteeLine: 0.96, target: 0.98, window: { kind: 'run' } }, {
    state: 'gathering', since: plantStart - 22 * minute, estimate: 0.985, bound: 0.951, oppositeBound: undefined, allowance: { estimate: -0.25, bound: 1.45, opposite: undefined, trail: [6, 4, 3, 2.2, 1.8, 1.45] },
    figures: { inspected: 63, nonconforming: 1, filled: 0.214 }, margin: { unitsToGather: 231 }, drift: 'falling', product: 'BH-6',
  }),
];

const grounds = (sentence: string): Alarm['grounds'] => ({
  source: 'leak-a-1', sequence: 812_204, plantVersion: 'b1946ac92492', method: 'exact binomial', methodVersion: 1, lookRule: 'all looks', figures: { inspected: 48_210, nonconforming: 15 }, records: [], sentence,
});

export const alarms: readonly Alarm[] = [
  { id: 41, guarantee: 'leak-bh4', rule: 'violation', priority: 'high', safetyRelevant: true, raisedAt: (plantStart - 6 * minute) as never, times: 2, state: { kind: 'raised' }, response: 'Hold the lot. Check the crimping die of station 2, then call maintenance.', grounds: grounds('15 nonconforming of 48,210 units: the lower bound of 216 ppm stands above the line of 200 ppm.') },
  { id: 40, guarantee: 'pull-bh5', rule: 'crossing', priority: 'medium', safetyRelevant: false, raisedAt: (plantStart - 19 * minute) as never, times: 1, state: { kind: 'acknowledged', acknowledgement: { by: 'Ines Maurer', at: (plantStart - 15 * minute) as never, note: 'Die changed, watching' } }, response: 'Measure five hoses by hand and compare.', grounds: grounds('The upper bound of 336 ppm crossed the line of 300 ppm.') },
  { id: 39, guarantee: 'cap-torque', rule: 'silence', priority: 'low', safetyRelevant: false, raisedAt: (plantStart - 2 * minute) as never, times: 1, state: { kind: 'raised' }, response: 'Look at the torque sensor’s cable.', grounds: grounds('No record for 2 minutes while the line is said to run.') },
  { id: 38, guarantee: 'final-bh4', rule: 'deterioration', priority: 'medium', safetyRelevant: false, raisedAt: (plantStart - 180 * minute) as never, times: 1, state: { kind: 'ended', returnedAt: (plantStart - 140 * minute) as never, acknowledgement: { by: 'Tom Reiter', at: (plantStart - 170 * minute) as never, note: '' } }, response: '', grounds: grounds('The rate had risen to about twice the normal one.') },
];

const extraNames = ['leak test', 'burst sample', 'final inspection', 'surface flaws', 'crimp height', 'label print', 'bend test', 'cut length'];

/** The eight and more lanes of the same kind, up to `count`. */
export function guaranteesOf(count: number): readonly FakeGuarantee[] {
  const more = Array.from({ length: Math.max(0, count - 8) }, (_, index) => {
    const used = 0.12 + ((index * 37) % 97) / 115;
    const loud = index % 23 === 11;
    const bound = loud ? 1.05 + (index % 7) / 5 : used;
    const line = index % 3;
    return guarantee(
      { id: `extra-${index}`, name: `BH-${4 + (index % 9)} ${extraNames[index % 8] ?? ''}`, ...(line === 1 ? lineB : line === 2 ? bottling : {}), stationNames: [`Station ${1 + (index % 6)}`] },
      {
        state: loud ? 'undecided' : 'demonstrated', estimate: bound * 90e-6, bound: bound * 200e-6, newest: plantStart - 300 - index * 10,
        allowance: { estimate: bound * 0.45, bound, opposite: undefined, trail: [bound * 0.9, bound * 0.93, bound * 0.97, bound] },
        margin: loud ? { conformingToDemonstrate: 900 + index * 13 } : { canTake: 1 + (index % 9) }, drift: loud ? 'rising' : 'steady',
      },
    );
  });
  return [...eight, ...more].slice(0, count);
}

export function snapshotOf(guarantees: readonly FakeGuarantee[], clockRate: number): LiveSnapshot {
  const ids = new Set(guarantees.map(({ card }) => card.id));
  return {
    type: 'snapshot', boot: 'boot-1', revision: 1, at: plantStart, clockRate, demo: clockRate !== 1,
    plant: {
      name: 'Hose plant Steyr', timeZone: 'Europe/Vienna', version: 'b1946ac92492',
      lines: [{ id: 'a', name: 'Hose line A' }, { id: 'b', name: 'Hose line B' }, { id: 'f', name: 'Fluid bottling' }],
      shift: { name: 'early shift', since: plantStart - 192 * minute, until: plantStart + 288 * minute },
    },
    cards: guarantees.map(({ card }) => card),
    views: guarantees.map(({ view }) => view),
    alarms: alarms.filter((alarm) => ids.has(alarm.guarantee)),
  };
}
