import { Option, type Command } from 'commander';
import { exactOfText } from '../../core/figure/exact.ts';
import { alarmPlan } from '../plan/alarm-plan.ts';
import { budgetPlan, type NamedStream } from '../plan/budget-plan.ts';
import { Cancelled } from '../plan/long-run.ts';
import { planned } from '../plan/planned.ts';
import { watchRun } from '../plan/run-watch.ts';
import { alarmAsked, type AlarmTold } from './alarm-asked.ts';
import { CommandFault } from './exit-codes.ts';
import { printPlan } from './print-plan.ts';
import { badOption, required, toldNumber } from './told-figures.ts';

const cancelledCode = 130;
const flags = { wanted: 'between', unitsBetweenFalseCalls: 'between', baseline: 'line', normal: 'normal-rate' };

/** Adds the plans of alarm settings and of the plant's budget. */
export function addAlarmAndBudget(plan: Command): void {
  const alarm = plan
    .command('alarm')
    .description('how often an alarm setting calls falsely, and how late it calls')
    .addOption(new Option('--rule <rule>', 'what calls').choices(['window', 'cusum', 'detector']))
    .option('--line <value>', "what the rule holds the line to: its guarantee line (or normal rate), e.g. '200 ppm', '2 per 100 m', or with --side a mean")
    .option('--normal-rate <rate>', 'rate of the line when it is well [default: the line]')
    .option('--worse <rate...>', 'rate (or mean) after a change; may be repeated [default: 2, 3, 5 and 10 times the line; half, 1, 2 and 3 sigma beyond it]')
    .option('--per-day <number>', 'units (exposure, measurements) a day: adds false calls a month and times')
    .option('--units <number>', 'window rule: units in the window')
    .option('--exposure <amount>', "window rule of a rate: exposure in the window, e.g. '4600 m'")
    .option('--count <number>', 'window rule: nonconforming units (nonconformities) that call')
    .option('--confidence <level>', 'window rule: in place of --count, the level at which the window shows the line violated')
    .option('--batch <number>', 'window rule: units (exposure) between looks [default: at each]')
    .option('--ratio <number>', 'cusum: size of change it is tuned to [default: 2]')
    .option('--between <number>', 'cusum and detector: wanted units (exposure, measurements) between false calls')
    .addOption(new Option('--side <side>', 'detector of a mean: what the promise says').choices(['at-least', 'at-most']))
    .option('--mean <number>', 'detector of a mean: mean of the line when it is well [default: the line]')
    .option('--sigma <number>', 'detector of a mean: its standard deviation')
    .option('--range <from..to>', 'detector of a mean: the ends between which every measurement lies, in place of a known sigma')
    .option('--unit <text>', 'of a mean: unit of measure, for the sentence')
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
      const { rule, scene } = alarmAsked(told);
      return alarmPlan(rule, scene, watch);
    });
    printPlan(answer, told.json === true);
  } catch (cause) {
    if (cause instanceof Cancelled) throw new CommandFault('Cancelled.', cancelledCode);
    throw cause;
  } finally {
    end();
  }
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
