import * as v from 'valibot';
import type { DetectorView } from '../../../core/run/detector-view.ts';
import type { GuaranteeCard, GuaranteeView } from '../../../core/view/guarantee-view.ts';
import type { History, Picture, Strip } from '../../../core/view/history.ts';
import type { RunPaths, RunView } from '../../../core/view/run-view.ts';
import type { Together } from '../../../core/view/together.ts';
import { figures, limitSide, methodTold, moment, number, text, whole } from './answer-parts.ts';
import { evidenceState, happeningAnswer } from './happening-answers.ts';
import type { Sent } from './sent.ts';

const lookRule = v.picklist(['one look', 'all looks']);
const numbers = v.array(number);
const moments = v.array(moment);

const card: v.GenericSchema<Sent<GuaranteeCard>> = v.strictObject({
  id: text,
  name: text,
  line: text,
  lineName: text,
  stationNames: v.array(text),
  product: v.optional(text),
  productName: v.optional(text),
  characteristicName: text,
  quantity: v.picklist(['nonconforming-fraction', 'yield', 'rate', 'mean', 'fraction-beyond-limit', 'chained-yield', 'lot-fraction']),
  side: v.picklist(['at-most', 'at-least']),
  scale: v.variant('kind', [
    v.strictObject({ kind: v.literal('share') }),
    v.strictObject({ kind: v.literal('rate'), per: number, unit: text }),
    v.strictObject({ kind: v.literal('measure'), unit: text }),
  ]),
  guaranteeLine: v.pipe(number, v.description("In the scale's unit; shares as fractions.")),
  target: number,
  confidence: v.pipe(text, v.description("As a decimal, e.g. '0.95'.")),
  tail: v.pipe(number, v.description('Its complement to 1.')),
  window: v.variant('kind', [
    v.strictObject({ kind: v.literal('units'), units: whole }),
    v.strictObject({ kind: v.literal('time'), spanMs: number, stepMs: number }),
    v.strictObject({ kind: v.literal('lot') }),
    v.strictObject({ kind: v.literal('shift') }),
    v.strictObject({ kind: v.literal('run') }),
  ]),
  looks: v.pipe(v.picklist(['one look', 'all looks', 'both']), v.description('What decides: the window at one look, the run at all looks, or the window with the run calling the violation.')),
  safetyRelevant: v.boolean(),
  specificationLimit: v.optional(v.strictObject({ side: limitSide, value: number, unit: text })),
  method: methodTold,
});

const detector: v.GenericSchema<Sent<DetectorView>> = v.strictObject({
  kind: v.picklist(['mixture', 'cusum']),
  gauge: v.pipe(number, v.description('Share of the way to its alarm, 0 to 1; while its alarm stands, of the way back.')),
  alarmed: v.boolean(),
  inARowToAlarm: v.optional(whole),
  conformingToHalfWay: v.optional(whole),
  toReturn: v.optional(v.pipe(number, v.description('Conforming units (or exposure) until its alarm returns.'))),
  betweenFalseCalls: number,
  baseline: number,
  against: v.picklist(['line', 'normal-rate']),
  doubt: v.optional(v.pipe(text, v.description('Why the distance between false calls does not hold now, and what to do.'))),
});

const run: v.GenericSchema<Sent<RunView>> = v.strictObject({
  number: whole,
  cause: v.picklist(['first', 'restart', 'lot', 'changeover']),
  detail: text,
  begunAt: v.optional(moment),
  decides: v.picklist(['state', 'violation', 'nothing']),
  kept: v.optional(v.pipe(number, v.description('log10 of the evidence that the guarantee is kept.'))),
  broken: v.optional(v.pipe(number, v.description('log10 of the evidence that it is broken.'))),
  enoughKept: number,
  enoughBroken: number,
  bound: v.optional(number),
  opposite: v.optional(number),
  figures,
  keptAt: v.optional(moment),
  brokenAt: v.optional(moment),
  method: methodTold,
});

const view: v.GenericSchema<Sent<GuaranteeView>> = v.strictObject({
  id: text,
  state: evidenceState,
  remark: v.optional(text),
  since: moment,
  lookRule,
  oppositeLookRule: lookRule,
  estimate: v.optional(number),
  bound: v.optional(number),
  oppositeBound: v.optional(number),
  allowance: v.pipe(
    v.strictObject({ estimate: v.optional(number), bound: v.optional(number), opposite: v.optional(number), trail: numbers }),
    v.description('Allowance used: 0 at the target, 1 on the guarantee line.'),
  ),
  figures,
  margin: v.strictObject({ canTake: v.optional(whole), conformingToDemonstrate: v.optional(whole), unitsToGather: v.optional(whole), clearance: v.optional(number) }),
  newest: v.optional(moment),
  detector: v.optional(detector),
  run: v.optional(run),
  drift: v.optional(v.picklist(['rising', 'falling', 'steady'])),
  product: v.optional(text),
  lot: v.optional(text),
  alarmIds: v.array(whole),
  lineRunning: v.optional(v.boolean()),
  warnings: v.array(text),
});
export const guaranteesAnswer = v.array(v.strictObject({ card, view }));

export const togetherAnswer: v.GenericSchema<Sent<Together>> = v.strictObject({
  tail: number,
  demonstrated: v.array(text),
  among: whole,
  left: v.pipe(v.array(text), v.description('Ids of which nothing is said: no evidence at all looks is known for them.')),
});

const gaps = v.array(v.nullable(number));
export const historyAnswer: v.GenericSchema<Sent<History>> = v.strictObject({
  guarantee: text,
  from: moment,
  to: moment,
  at: moments,
  stepMs: number,
  inspected: numbers,
  nonconforming: numbers,
  estimate: gaps,
  bound: gaps,
  opposite: gaps,
  state: v.array(evidenceState),
  events: v.array(happeningAnswer),
});

export const stripAnswer: v.GenericSchema<Sent<Strip>> = v.strictObject({
  guarantee: text,
  units: number,
  full: v.optional(number),
  nonconforming: v.array(v.strictObject({ place: whole, at: v.optional(moment), source: text, sequence: whole })),
  left: whole,
});

export const pictureAnswer: v.GenericSchema<Sent<Picture>> = v.variant('kind', [
  v.strictObject({ kind: v.literal('none') }),
  v.strictObject({
    kind: v.literal('distribution'),
    unit: text,
    edges: numbers,
    counts: numbers,
    mean: number,
    sd: number,
    limit: v.optional(v.strictObject({ side: limitSide, value: number })),
    model: v.strictObject({ verdict: v.picklist(['fits', 'does not fit', 'too few values', 'not used']), sentence: text }),
  }),
  v.strictObject({ kind: v.literal('steps'), from: moment, stepMs: number, inspected: v.array(whole), nonconforming: v.array(whole) }),
  v.strictObject({
    kind: v.literal('stations'),
    stations: v.array(v.strictObject({ id: text, name: text, inspected: whole, nonconforming: whole, yield: number, limiting: v.boolean() })),
  }),
]);

export const runPathsAnswer: v.GenericSchema<Sent<RunPaths>> = v.strictObject({
  guarantee: text,
  run: v.strictObject({ at: moments, kept: numbers, broken: numbers }),
  gauge: v.strictObject({ at: moments, gauge: numbers }),
});
