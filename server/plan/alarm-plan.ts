import { writtenNumber } from '../../core/describe/rounded.ts';
import { briefShare } from '../../core/describe/share-text.ts';
import type { AlarmRule, MeanUnits, Simulating } from './alarm-rule.ts';
import { barPicture } from './bar-picture.ts';
import { runLong, type RunWatch } from './long-run.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** The line that the alarm setting is examined on. */
export interface AlarmScene {
  /** rate at which the line is well, above 0, below 1 */
  readonly normal: number;
  /** rates after a change for the worse */
  readonly worse: readonly number[];
  /** units a day; undefined: figures in units only */
  readonly perDay: number | undefined;
}

/** A month in days, for false calls a month. */
const monthDays = 30;
/** A simulated mean is good enough at a standard error of 1 %, from so many runs on. */
const enoughRuns = 400;
const enoughError = 0.01;

/** How often a setting calls falsely and how late it calls. @throws Cancelled; OutOfDomain */
export async function alarmPlan(rule: AlarmRule, { normal, worse, perDay }: AlarmScene, watch: RunWatch): Promise<PlanAnswer> {
  const between = await settled(rule.betweenCalls(normal), watch);
  const delays: { readonly rate: number; readonly delay: MeanUnits }[] = [];
  for (const rate of worse) delays.push({ rate, delay: await settled(rule.delay(normal, rate), watch) });
  const perMonth = perDay === undefined ? undefined : (monthDays * perDay) / between.units;
  const days = (units: number): string => (perDay === undefined ? '' : daysText(units / perDay));
  return {
    sentences: [
      rule.sentence,
      `At its normal rate of ${briefShare(normal)} it calls falsely once in ${meanText(between)} units${perMonth === undefined ? '' : `, ${between.standing === 'at least' ? 'at most ' : ''}${writtenNumber(perMonth, 3)} times a month of ${monthDays} days at ${writtenNumber(perDay ?? 0, 15)} units a day`}.`,
    ],
    table: {
      head: ['rate after the change', 'times normal', 'units to the call', ...(perDay === undefined ? [] : ['time'])],
      rows: delays.map(({ rate, delay }) => [briefShare(rate), writtenNumber(rate / normal, 3), meanText(delay), ...(perDay === undefined ? [] : [days(delay.units)])]),
    },
    picture: barPicture('Mean units', [
      { name: 'between false calls', value: between.units, written: meanText(between) },
      ...delays.map(({ rate, delay }) => ({ name: `to the call at ${briefShare(rate)}`, value: delay.units, written: meanText(delay) })),
    ]),
    notes: [
      ['Assumes', 'Nonconforming units come one by one and independently; where they come in clusters, false calls are more frequent than said.'],
      ['Looks', 'Watched all the time: these are figures of all looks, not of one.'],
      ...rule.notes,
    ],
    json: {
      plan: 'alarm',
      ...rule.json,
      normal,
      betweenFalseCalls: between,
      falseCallsPerMonth: perMonth,
      unitsPerDay: perDay,
      delays: delays.map(({ rate, delay }) => ({ rate, ...delay, days: perDay === undefined ? undefined : delay.units / perDay })),
    },
  };
}

async function settled(figure: MeanUnits | Simulating, watch: RunWatch): Promise<MeanUnits> {
  if (!('next' in figure)) return figure;
  const { units, standardError } = await runLong(figure, watch, ({ runs, units: mean, standardError: error }) => runs >= enoughRuns && error < enoughError * mean);
  return { units, standardError, standing: 'about' };
}

function meanText({ units, standardError, standing }: MeanUnits): string {
  const figure = writtenNumber(Math.round(units) < 1e5 ? Math.round(units) : Number(units.toPrecision(4)), 4);
  return `${standing === 'at least' ? 'at least ' : ''}${figure}${standardError === undefined ? '' : ` ± ${writtenNumber(Number(standardError.toPrecision(2)), 2)}`}`;
}

function daysText(days: number): string {
  if (days >= 2) return `${writtenNumber(days, 3)} days`;
  return days >= 2 / 24 ? `${writtenNumber(24 * days, 3)} h` : `${writtenNumber(1440 * days, 3)} min`;
}
