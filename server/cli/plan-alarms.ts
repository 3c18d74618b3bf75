import { Option, type Command } from 'commander';
import { violatedCount } from '../../core/bound/critical-count.ts';
import { exactOfText } from '../../core/figure/exact.ts';
import { alarmPlan, type AlarmScene } from '../plan/alarm-plan.ts';
import type { AlarmRule } from '../plan/alarm-rule.ts';
import { cusumRule, detectorRule, windowRule } from '../plan/alarm-rules.ts';
import { budgetPlan, type NamedStream } from '../plan/budget-plan.ts';
import { Cancelled } from '../plan/long-run.ts';
import { planned } from '../plan/planned.ts';
import { watchRun } from '../plan/run-watch.ts';
import { CommandFault } from './exit-codes.ts';
import { printPlan } from './print-plan.ts';
import { badOption, required, toldNumber, toldPart, toldTail, toldWhole } from './told-figures.ts';

interface AlarmTold {
  readonly rule?: 'window' | 'cusum' | 'detector';
  readonly line?: string;
  readonly normalRate?: string;
  readonly worse?: readonly string[];
  readonly perDay?: string;
  readonly units?: string;
  readonly count?: string;
  readonly confidence?: string;
  readonly batch?: string;
  readonly ratio?: string;
  readonly between?: string;
  readonly runs?: string;
  readonly json?: true;
}

const cancelledCode = 130;
const flags = { wanted: 'between', unitsBetweenFalseCalls: 'between', baseline: 'line', normal: 'normal-rate' };

/** Adds the plans of alarm settings and of the plant's budget. */
export function addAlarmAndBudget(plan: Command): void {
  const alarm = plan
    .command('alarm')
    .description('how often an alarm setting calls falsely, and how late it calls')
    .addOption(new Option('--rule <rule>', 'what calls').choices(['window', 'cusum', 'detector']))
    .option('--line <share>', "what the rule holds the line to: its guarantee line (or normal rate), e.g. '200 ppm'")
    .option('--normal-rate <share>', 'rate of the line when it is well [default: the line]')
    .option('--worse <share...>', 'rate after a change; may be repeated [default: 2, 3, 5 and 10 times the line]')
    .option('--per-day <number>', 'units a day: adds false calls a month and times')
    .option('--units <number>', 'window rule: units in the window')
    .option('--count <number>', 'window rule: nonconforming units that call')
    .option('--confidence <level>', 'window rule: in place of --count, the level at which the window shows the line violated')
    .option('--batch <number>', 'window rule: units between looks [default: 1]')
    .option('--ratio <number>', 'cusum: size of change it is tuned to [default: 2]')
    .option('--between <number>', 'cusum and detector: wanted units between false calls')
    .option('--runs <number>', 'simulated figures: runs at most [default: 4000]')
    .option('--json', 'print JSON');
  alarm.action(() => examineAlarm(alarm.opts<AlarmTold>()));

  const budget = plan
    .command('budget')
    .description('spread the false calls a plant accepts in a shift over its guarantees')
    .option('--false-calls <number>', 'accepted a shift over all guarantees, e.g. 0.5')
    .option('--stream <name=units*weight...>', 'a guarantee with its units a shift, and its weight (1 when absent); may be repeated')
    .addOption(new Option('--sharing <how>', 'the same part for every unit, or for every guarantee').choices(['by-size', 'by-stream']).default('by-size'))
    .option('--json', 'print JSON');
  budget.action(() => spread(budget.opts<BudgetTold>()));
}

async function examineAlarm(told: AlarmTold): Promise<void> {
  const { watch, end } = watchRun();
  try {
    const answer = await planned(flags, () => {
      const baseline = toldPart('line', required('line', told.line, 'the rate that the rule holds the line to'));
      return alarmPlan(ruleOf(told, baseline), sceneOf(told, baseline), watch);
    });
    printPlan(answer, told.json === true);
  } catch (cause) {
    if (cause instanceof Cancelled) throw new CommandFault('Cancelled.', cancelledCode);
    throw cause;
  } finally {
    end();
  }
}

function sceneOf({ normalRate, worse, perDay }: AlarmTold, baseline: number): AlarmScene {
  const usual = [2, 3, 5, 10].map((times) => Number((times * baseline).toPrecision(12))).filter((rate) => rate < 1);
  const normal = normalRate === undefined ? baseline : toldPart('normal-rate', normalRate);
  const rates = worse?.map((text) => toldPart('worse', text)) ?? usual;
  const better = rates.findIndex((rate) => !(rate > normal));
  if (better >= 0) throw badOption('worse', worse?.[better] ?? String(rates[better]), `a rate above the normal rate ${normal}`);
  return { normal, worse: rates, perDay: perDay === undefined ? undefined : toldWhole('per-day', perDay, 1) };
}

function ruleOf(told: AlarmTold, baseline: number): AlarmRule {
  const runs = toldWhole('runs', told.runs ?? '4000', 2, 1_000_000);
  const between = (): number => toldNumber('between', required('between', told.between, 'the wanted units between false calls'));
  const { rule } = told;
  if (rule === undefined) throw new CommandFault('--rule is missing; expected window, cusum or detector');
  switch (rule) {
    case 'window': {
      const units = toldWhole('units', required('units', told.units, 'the units in the window'), 2, 1e9);
      return windowRule({ units, count: countOf(told, units, baseline) }, toldWhole('batch', told.batch ?? '1', 1), runs);
    }
    case 'cusum':
      return cusumRule(baseline, toldNumber('ratio', told.ratio ?? '2'), between());
    case 'detector':
      return detectorRule(baseline, between(), runs);
  }
}

function countOf({ count, confidence }: AlarmTold, units: number, baseline: number): number {
  if (count !== undefined && confidence !== undefined) throw new CommandFault('--count and --confidence: give one; the other follows');
  if (count !== undefined) return toldWhole('count', count, 1, units);
  const tail = toldTail('confidence', required('confidence', confidence, 'a confidence level, or --count'));
  const violated = violatedCount(units, baseline, tail);
  if (violated <= units) return violated;
  throw badOption('units', String(units), 'a window large enough to show the line violated at this confidence');
}

interface BudgetTold {
  readonly falseCalls?: string;
  readonly stream?: readonly string[];
  readonly sharing: 'by-size' | 'by-stream';
  readonly json?: true;
}

async function spread({ falseCalls, stream, sharing, json }: BudgetTold): Promise<void> {
  const accepted = toldNumber('false-calls', required('false-calls', falseCalls, 'false calls a shift that the plant accepts, e.g. 0.5'));
  if (stream === undefined) throw new CommandFault('--stream is missing; expected NAME=UNITS or NAME=UNITS*WEIGHT, once a guarantee');
  const streams = stream.map(streamOf);
  printPlan(await planned({}, () => budgetPlan(accepted, streams, sharing === 'by-size' ? 'by size' : 'by stream')), json === true);
}

function streamOf(text: string): NamedStream {
  const parts = /^([^=]+)=([^*]+)(?:\*(.+))?$/.exec(text.trim());
  const [, name = '', units = '', weight = '1'] = parts ?? [];
  if (parts === null || exactOfText(units.trim()) === undefined || exactOfText(weight.trim()) === undefined) throw badOption('stream', text, 'NAME=UNITS or NAME=UNITS*WEIGHT, e.g. leak-A=9600*2');
  return { name, perShift: toldNumber('stream', units), weight: toldNumber('stream', weight) };
}
