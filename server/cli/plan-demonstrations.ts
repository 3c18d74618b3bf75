import { Option, type Command } from 'commander';
import { amountForms, amountOf, type Amount } from '../../core/figure/amount.ts';
import { fractionDemonstration, lotDemonstration, rateDemonstration, yieldDemonstration, type AskedDemonstration } from '../plan/demonstrations.ts';
import { meanDemonstration } from '../plan/mean-demonstration.ts';
import { planned } from '../plan/planned.ts';
import { windowFor, windowOf } from '../plan/window-plan.ts';
import { CommandFault } from './exit-codes.ts';
import { printPlan } from './print-plan.ts';
import { badOption, required, toldNumber, toldPart, toldShare, toldTail, toldWhole } from './told-figures.ts';

type Told = Readonly<Record<string, string | readonly string[] | boolean | undefined>>;

const one = (told: Told, name: string): string | undefined => (typeof told[name] === 'string' ? told[name] : undefined);
const many = (told: Told, name: string): readonly string[] => (Array.isArray(told[name]) ? (told[name] as readonly string[]) : []);
const confidence = (told: Told): ReturnType<typeof toldTail> => toldTail('confidence', required('confidence', one(told, 'confidence'), 'a confidence level, e.g. 95 % or 0.95'));
const line = (told: Told, what: string): string => required('line', one(told, 'line'), what);

function askedOf(told: Told, truth: (text: string) => number): AskedDemonstration {
  return { tail: confidence(told), allowed: toldWhole('allowed', one(told, 'allowed') ?? '0', 0, 1_000_000), truths: many(told, 'rate').map(truth) };
}

function amountFrom(flag: string, text: string): Amount {
  const amount = amountOf(text);
  if (amount === undefined) throw badOption(flag, text, amountForms);
  return amount;
}

/** A true rate in the unit of the line, per unit of exposure. */
function rateIn(unit: string) {
  return (text: string): number => {
    const amount = amountFrom('rate', text);
    if (amount.unit !== unit) throw badOption('rate', text, `a rate per ${unit}, as the line is`);
    return amount.value / amount.per;
  };
}

/** Adds the plans of demonstrations and windows. */
export function addDemonstrations(plan: Command): void {
  const sub = (name: string, description: string, lineForm: string): Command =>
    plan
      .command(name)
      .description(description)
      .option('--line <value>', `guarantee line, ${lineForm}`)
      .option('--confidence <level>', "confidence level, e.g. '95 %'")
      .option('--json', 'print JSON');
  const demonstration = (name: string, description: string, lineForm: string): Command =>
    sub(name, description, lineForm).option('--allowed <number>', 'nonconforming ones with which it still passes [default: 0]').option('--rate <value...>', 'true figure at which the chance of passing is wanted; may be repeated');

  const fraction = demonstration('fraction', 'smallest number of units that demonstrates a nonconforming fraction', "e.g. '200 ppm'");
  act(fraction, (told) => fractionDemonstration(toldShare('line', line(told, 'a share of units')), askedOf(told, (text) => toldShare('rate', text))));

  const yieldPlan = demonstration('yield', 'smallest number of units that demonstrates a yield', "e.g. '98.5 %'");
  act(yieldPlan, (told) => yieldDemonstration(toldShare('line', line(told, 'a share of units')), askedOf(told, (text) => toldShare('rate', text))));

  const rate = demonstration('rate', 'smallest exposure that demonstrates a rate of nonconformities', "e.g. '2 per 100 m'");
  act(rate, (told) => {
    const amount = amountFrom('line', line(told, amountForms));
    return rateDemonstration(amount, askedOf(told, rateIn(amount.unit)));
  });

  const lot = demonstration('lot', 'smallest sample that demonstrates the nonconforming fraction of a lot', "e.g. '1 %'").option('--lot-size <number>', 'units in the lot');
  act(lot, (told) => lotDemonstration(toldWhole('lot-size', required('lot-size', one(told, 'lotSize'), 'a whole number of units'), 1), toldShare('line', line(told, 'a share of the lot')), askedOf(told, (text) => toldWhole('rate', text))));

  addMean(sub('mean', 'measurements that demonstrate a mean, where the process runs as supposed', 'in the unit of measure'));
  addWindow(sub('window', 'the window that keeps a well line demonstrated; or what a given window does', "e.g. '200 ppm'"));
}

function addMean(mean: Command): void {
  mean
    .addOption(new Option('--side <side>', 'what the promise says').choices(['at-least', 'at-most']))
    .option('--mean <number>', 'mean at which the process is supposed to run')
    .option('--sigma <number>', 'standard deviation it is supposed to have')
    .option('--sigma-known', 'the bound will use this sigma (z), not the spread of the sample (t)')
    .option('--chance <share>', 'wanted chance of passing [default: 90 %]')
    .option('--unit <text>', 'unit of measure, for the sentence');
  act(mean, (told) => {
    const side = required('side', one(told, 'side'), 'at-least or at-most');
    return meanDemonstration({
      promise: { side: side === 'at-most' ? 'at-most' : 'at-least', line: toldNumber('line', line(told, 'a number in the unit of measure')) },
      process: {
        mean: toldNumber('mean', required('mean', one(told, 'mean'), 'the supposed mean')),
        sigma: toldNumber('sigma', required('sigma', one(told, 'sigma'), 'the supposed standard deviation')),
        sigmaKnown: told['sigmaKnown'] === true,
      },
      tail: confidence(told),
      chance: toldPart('chance', one(told, 'chance') ?? '90 %'),
      unit: one(told, 'unit'),
    });
  });
}

function addWindow(window: Command): void {
  window
    .option('--normal-rate <share>', 'the rate the line has when it is well: proposes a window')
    .option('--units <number>', 'a window: says up to which normal rate it keeps a line demonstrated')
    .option('--lost <share>', 'share of the time a well line may stand not demonstrated [default: 1 %]');
  act(window, (told) => {
    const wish = { line: toldShare('line', line(told, 'a share of units')), tail: confidence(told), lost: toldPart('lost', one(told, 'lost') ?? '1 %') };
    const [normal, units] = [one(told, 'normalRate'), one(told, 'units')];
    if (normal !== undefined && units !== undefined) throw new CommandFault('--normal-rate and --units: give one; the other is the answer');
    if (normal !== undefined) return windowFor(wish, toldShare('normal-rate', normal));
    return windowOf(wish, toldWhole('units', required('units', units, 'a window in units, or --normal-rate to have one proposed'), 1, 1e9));
  });
}

function act(command: Command, answer: (told: Told) => ReturnType<typeof windowOf>): void {
  command.action(async () => {
    const told = command.opts<Told>();
    printPlan(await planned({ normal: 'normal-rate', yieldLine: 'line', tail: 'confidence', nonconforming: 'allowed', marked: 'rate' }, () => answer(told)), told['json'] === true);
  });
}
