import { writtenNumber } from '../../core/describe/rounded.ts';
import type { AlarmRule, MeanUnits, Simulating } from './alarm-rule.ts';
import { barPicture } from './bar-picture.ts';
import { runLong, type RunWatch } from './long-run.ts';
import type { PlanAnswer } from './plan-answer.ts';

/** The line that the alarm setting is examined on. */
export interface AlarmScene {
  /** rate (or mean) at which the line is well */
  readonly normal: number;
  /** rates (or means) after a change for the worse */
  readonly worse: readonly number[];
  /** units (exposure, measurements) a day; undefined: figures in those only */
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
  const { unit, level, rate: written, assumes } = rule.said;
  const times = level === 'rate' && normal > 0;
  const days = (units: number): string => (perDay === undefined ? '' : daysText(units / perDay));
  return {
    sentences: [
      rule.sentence,
      `At its normal ${level} of ${written(normal)} it calls falsely once in ${meanText(between)} ${unit}${perMonth === undefined ? '' : `, ${between.standing === 'at least' ? 'at most ' : ''}${writtenNumber(perMonth, 3)} times a month of ${monthDays} days at ${writtenNumber(perDay ?? 0, 15)} ${unit} a day`}.`,
    ],
    table: {
      head: [`${level} after the change`, ...(times ? ['times normal'] : []), `${unit} to the call`, ...(perDay === undefined ? [] : ['time'])],
      rows: delays.map(({ rate, delay }) => [written(rate), ...(times ? [writtenNumber(rate / normal, 3)] : []), meanText(delay), ...(perDay === undefined ? [] : [days(delay.units)])]),
    },
    picture: barPicture(`Mean ${unit}`, [
      { name: 'between false calls', value: between.units, written: meanText(between) },
      ...delays.map(({ rate, delay }) => ({ name: `to the call at ${written(rate)}`, value: delay.units, written: meanText(delay) })),
    ]),
    notes: [
      ['Assumes', assumes],
      ['Looks', 'Watched all the time: these are figures of all looks, not of one.'],
      ...rule.notes,
    ],
    json: {
      plan: 'alarm',
      ...rule.json,
      normal,
      betweenFalseCalls: between,
      falseCallsPerMonth: perMonth,
      ...(unit === 'units' ? { unitsPerDay: perDay } : { unit, perDay }),
      delays: delays.map(({ rate, delay }) => ({ [level]: rate, ...delay, days: perDay === undefined ? undefined : delay.units / perDay })),
    },
  };
}

async function settled(figure: MeanUnits | Simulating, watch: RunWatch): Promise<MeanUnits> {
  if (!('steps' in figure)) return figure;
  const { units, standardError } = await runLong(figure.steps, watch, ({ runs, units: mean, standardError: error }) => runs >= enoughRuns && error < enoughError * mean);
  return { units: units * figure.grain, standardError: standardError * figure.grain, standing: 'about' };
}

function meanText({ units, standardError, standing }: MeanUnits): string {
  const whole = Math.round(units) < 1e5 ? (units < 100 ? Number(units.toPrecision(3)) : Math.round(units)) : Number(units.toPrecision(4));
  const figure = writtenNumber(whole, 4);
  return `${standing === 'at least' ? 'at least ' : ''}${figure}${standardError === undefined ? '' : ` ± ${writtenNumber(Number(standardError.toPrecision(2)), 2)}`}`;
}

function daysText(days: number): string {
  if (days >= 2) return `${writtenNumber(days, 3)} days`;
  return days >= 2 / 24 ? `${writtenNumber(24 * days, 3)} h` : `${writtenNumber(1440 * days, 3)} min`;
}
