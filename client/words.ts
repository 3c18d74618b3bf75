import type { Alarm } from '../core/alarm/alarm.ts';
import type { EvidenceState, LookRule } from '../core/evidence/evidence-state.ts';
import type { Priority, RuleKind, WindowRule } from '../core/plant/guarantee.ts';
import type { DetectorView } from '../core/run/detector-view.ts';
import type { GuaranteeCard, GuaranteeView } from '../core/view/guarantee-view.ts';
import type { RunView } from '../core/view/run-view.ts';
import { written, type Formats } from './format.ts';

export const stateWord: Readonly<Record<EvidenceState, string>> = {
  gathering: 'Gathering',
  demonstrated: 'Demonstrated',
  undecided: 'Undecided',
  violated: 'Violated',
  unknown: 'Unknown',
};

export const stateMeaning: Readonly<Record<EvidenceState, string>> = {
  gathering: 'Even a faultless window of this size could not prove the guarantee yet.',
  demonstrated: 'The bound stands on the good side of the guarantee line.',
  undecided: 'The proof that the guarantee holds is lost; that it does not hold is not proven.',
  violated: 'The evidence says that the guarantee does not hold.',
  unknown: 'Nothing can be said: data are missing or contradictory, or the sum failed.',
};

export const ruleWord: Readonly<Record<RuleKind, string>> = {
  crossing: 'Bound crossed the guarantee line',
  violation: 'Guarantee violated',
  deterioration: 'Rate has risen',
  silence: 'No records',
  'bad-data': 'Bad data',
};

export const priorityWord: Readonly<Record<Priority, string>> = { high: 'High priority', medium: 'Medium priority', low: 'Low priority' };

export const alarmStateWord: Readonly<Record<Alarm['state']['kind'], string>> = {
  raised: 'Active, not acknowledged',
  acknowledged: 'Active, acknowledged',
  returned: 'Back to normal, not acknowledged',
  ended: 'Ended',
};

export const lookMeaning: Readonly<Record<LookRule, string>> = {
  'one look':
    'Valid at one look fixed in advance. Whoever looks again and again will see it on the wrong side more often than its level says; the alarm rules allow for that.',
  'all looks': 'Valid at all looks: it may be read at any moment, as often as you like, and stopped at will.',
};

export const counted = (formats: Formats, value: number, one: string, many = `${one}s`): string =>
  `${formats.count(value)} ${value === 1 ? one : many}`;

/** What is counted against the guarantee: units, or nonconformities where exposure is counted. */
const fault = (card: GuaranteeCard): string => (card.quantity === 'rate' ? 'nonconformity' : 'nonconforming unit');
const faults = (card: GuaranteeCard): string => (card.quantity === 'rate' ? 'nonconformities' : 'nonconforming units');

/** The line with its side: 'at most 200 ppm'. */
export const promisedLimit = (formats: Formats, card: GuaranteeCard): string =>
  `${card.side === 'at-most' ? 'at most' : 'at least'} ${written(formats.figure(card, card.guaranteeLine))}`;

/** What was promised, as a clause: 'at most 200 ppm nonconforming'. */
export function promiseWords(formats: Formats, card: GuaranteeCard): string {
  const limit = promisedLimit(formats, card);
  switch (card.quantity) {
    case 'nonconforming-fraction':
      return `${limit} nonconforming`;
    case 'yield':
      return `yield ${limit}`;
    case 'chained-yield':
      return `yield over ${counted(formats, card.stationNames.length, 'station')} ${limit}`;
    case 'rate':
      return limit;
    case 'mean':
      return `mean ${limit}`;
    case 'lot-fraction':
      return `${limit} of the lot nonconforming`;
    case 'fraction-beyond-limit': {
      const beyond = card.specificationLimit;
      return beyond === undefined ? `${limit} beyond the specification limit` : `${limit} ${beyond.side} ${formats.plain(beyond.value)} ${beyond.unit}`;
    }
  }
}

export function windowWords(formats: Formats, window: WindowRule, card?: Pick<GuaranteeCard, 'quantity'>): string {
  switch (window.kind) {
    case 'units':
      return `the last ${counted(formats, window.units, card?.quantity === 'rate' ? 'record' : 'unit')}`;
    case 'time':
      return `the last ${formats.span(window.spanMs)}`;
    case 'lot':
      return 'this lot';
    case 'shift':
      return 'this shift';
    case 'run':
      return 'since evidence was restarted';
  }
}

/** The margin in the words of someone who counts units; undefined where there is none to tell. */
export function marginWords(formats: Formats, card: GuaranteeCard, view: GuaranteeView): string | undefined {
  const { canTake, conformingToDemonstrate, unitsToGather, clearance } = view.margin;
  const unit = card.quantity === 'rate' ? 'faultless record' : 'conforming unit';
  if (unitsToGather !== undefined) return `Needs ${counted(formats, unitsToGather, `more ${unit}`)}`;
  if (conformingToDemonstrate !== undefined && view.state !== 'demonstrated') {
    return `Demonstrated again after ${counted(formats, conformingToDemonstrate, unit)} in a row`;
  }
  if (canTake !== undefined) {
    return canTake === 0 ? `Can take no more ${faults(card)}` : `Can take ${counted(formats, canTake, `more ${fault(card)}`, `more ${faults(card)}`)}`;
  }
  if (clearance === undefined || card.scale.kind !== 'measure') return undefined;
  const far = written({ text: formats.plain(Math.abs(clearance)), unit: card.scale.unit });
  return clearance >= 0 ? `Bound stands ${far} inside the line` : `Bound stands ${far} beyond the line`;
}

/** The margin in three words, for a lane one line high. */
export function marginBrief(formats: Formats, view: GuaranteeView): string | undefined {
  const { canTake, conformingToDemonstrate, unitsToGather } = view.margin;
  if (view.state === 'unknown') return undefined;
  if (unitsToGather !== undefined) return `${formats.count(unitsToGather)} to go`;
  if (view.state !== 'demonstrated' && conformingToDemonstrate !== undefined) return `${formats.count(conformingToDemonstrate)} to go`;
  return canTake === undefined ? undefined : `can take ${formats.count(canTake)}`;
}

/** Whether the state already says what the alarm says. */
export const saidByState = (state: EvidenceState, rule: RuleKind): boolean =>
  (state === 'violated' && rule === 'violation') || (state === 'undecided' && rule === 'crossing') || (state === 'unknown' && rule === 'silence');

export const driftWord = { rising: 'Bound rising', falling: 'Bound falling', steady: 'Bound steady' } as const;

/** What stands under the state: why it is unknown, or else the margin and where the bound is going. */
export function standing(formats: Formats, card: GuaranteeCard, view: GuaranteeView): string {
  if (view.state === 'unknown') return view.remark ?? stateMeaning.unknown;
  const parts = [marginWords(formats, card, view), view.drift === 'rising' ? 'Rising' : undefined];
  const words = parts.filter((part) => part !== undefined).join('. ');
  return words === '' ? (view.remark ?? stateMeaning[view.state]) : words;
}

/** "2 of 8 guarantees need you." */
export function headline(formats: Formats, needing: number, all: number): string {
  if (all === 0) return 'No guarantees yet.';
  if (needing === 0) return all === 1 ? 'The guarantee needs nothing from you.' : `None of ${formats.count(all)} guarantees needs you.`;
  return `${formats.count(needing)} of ${counted(formats, all, 'guarantee')} ${needing === 1 ? 'needs' : 'need'} you.`;
}

/** What would take a change detector to its alarm, and what brings it back. */
export function detectorWords(formats: Formats, { inARowToAlarm, conformingToHalfWay }: DetectorView, card: GuaranteeCard): string {
  const alarm = inARowToAlarm === undefined ? '' : `${counted(formats, inARowToAlarm, fault(card), faults(card))} in a row would raise it. `;
  const back = conformingToHalfWay === undefined || conformingToHalfWay === 0 ? '' : `Half way again after ${counted(formats, conformingToHalfWay, 'conforming unit')} in a row.`;
  return `${alarm}${back}`.trim();
}

/** How and when a run began. */
export function runBeginning(formats: Formats, { number, cause, detail, begunAt }: RunView): string {
  const since = begunAt === undefined ? '' : `, since ${formats.moment(begunAt)}`;
  switch (cause) {
    case 'first':
      return `Run ${formats.count(number)}${since}.`;
    case 'restart':
      return `Run ${formats.count(number)}${since}, begun by a restart: ${detail}.`;
    case 'lot':
      return `Run ${formats.count(number)}${since}, of lot ${detail}.`;
    case 'changeover':
      return `Run ${formats.count(number)}${since}, begun by the changeover to ${detail}.`;
  }
}
