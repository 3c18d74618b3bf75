import { Option, type Command } from 'commander';
import { amountForms, amountOf } from '../../core/figure/amount.ts';
import { fractionDemonstration, lotDemonstration, rateDemonstration, yieldDemonstration, type AskedDemonstration } from '../plan/demonstrations.ts';
import { meanDemonstration } from '../plan/mean-demonstration.ts';
import { planned } from '../plan/planned.ts';
import { countedExposure, countedUnits } from '../plan/counted.ts';
import { meanWindowFor, meanWindowOf } from '../plan/mean-window-plan.ts';
import type { PlanAnswer } from '../plan/plan-answer.ts';
import { windowFor, windowOf } from '../plan/window-plan.ts';
import { CommandFault } from './exit-codes.ts';
import { printPlan } from './print-plan.ts';
import { required, toldAmount, toldExposure, toldNumber, toldPart, toldRateIn, toldShare, toldTail, toldWhole } from './told-figures.ts';

type Told = Readonly<Record<string, string | readonly string[] | boolean | undefined>>;

const one = (told: Told, name: string): string | undefined => (typeof told[name] === 'string' ? told[name] : undefined);
const many = (told: Told, name: string): readonly string[] => (Array.isArray(told[name]) ? (told[name] as readonly string[]) : []);
const confidence = (told: Told): ReturnType<typeof toldTail> => toldTail('confidence', required('confidence', one(told, 'confidence'), 'a confidence level, e.g. 95 % or 0.95'));
const line = (told: Told, what: string): string => required('line', one(told, 'line'), what);

function askedOf(told: Told, truth: (text: string) => number): AskedDemonstration {
  return { tail: confidence(told), allowed: toldWhole('allowed', one(told, 'allowed') ?? '0', 0, 1_000_000), truths: many(told, 'rate').map(truth) };
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
    const amount = toldAmount('line', line(told, amountForms));
    return rateDemonstration(amount, askedOf(told, (text) => toldRateIn('rate', amount.unit, text)));
  });

  const lot = demonstration('lot', 'smallest sample that demonstrates the nonconforming fraction of a lot', "e.g. '1 %'").option('--lot-size <number>', 'units in the lot');
  act(lot, (told) => lotDemonstration(toldWhole('lot-size', required('lot-size', one(told, 'lotSize'), 'a whole number of units'), 1), toldShare('line', line(told, 'a share of the lot')), askedOf(told, (text) => toldWhole('rate', text))));

  addMean(sub('mean', 'measurements that demonstrate a mean, where the process runs as supposed', 'in the unit of measure'));
  addWindow(sub('window', 'the window that keeps a well line demonstrated; or what a given window does', "e.g. '200 ppm', '2 per 100 m', or with --side a mean"));
}

const sideOption = (): Option => new Option('--side <side>', 'what a promise about a mean says').choices(['at-least', 'at-most']);
const sideOf = (told: Told): 'at-least' | 'at-most' => (required('side', one(told, 'side'), 'at-least or at-most') === 'at-most' ? 'at-most' : 'at-least');
const sigmaOf = (told: Told): { readonly sigma: number; readonly sigmaKnown: boolean } => ({
  sigma: toldNumber('sigma', required('sigma', one(told, 'sigma'), 'the supposed standard deviation')),
  sigmaKnown: told['sigmaKnown'] === true,
});

function addMean(mean: Command): void {
  mean
    .addOption(sideOption())
    .option('--mean <number>', 'mean at which the process is supposed to run')
    .option('--sigma <number>', 'standard deviation it is supposed to have')
    .option('--sigma-known', 'the bound will use this sigma (z), not the spread of the sample (t)')
    .option('--chance <share>', 'wanted chance of passing [default: 90 %]')
    .option('--unit <text>', 'unit of measure, for the sentence');
  act(mean, (told) => {
    return meanDemonstration({
      promise: { side: sideOf(told), line: toldNumber('line', line(told, 'a number in the unit of measure')) },
      process: { mean: toldNumber('mean', required('mean', one(told, 'mean'), 'the supposed mean')), ...sigmaOf(told) },
      tail: confidence(told),
      chance: toldPart('chance', one(told, 'chance') ?? '90 %'),
      unit: one(told, 'unit'),
    });
  });
}

function addWindow(window: Command): void {
  window
    .option('--normal-rate <rate>', 'the rate the line has when it is well: proposes a window')
    .option('--units <number>', 'a window in units (of a mean: in measurements): says up to which normal rate it keeps a line demonstrated')
    .option('--exposure <amount>', "the same of a rate, e.g. '4600 m'")
    .addOption(sideOption())
    .option('--mean <number>', 'of a mean: the mean the line has when it is well, in place of --normal-rate')
    .option('--sigma <number>', 'of a mean: its standard deviation')
    .option('--sigma-known', 'of a mean: the bound will use this sigma (z), not the spread of the window (t)')
    .option('--unit <text>', 'of a mean: unit of measure, for the sentence')
    .option('--lost <share>', 'share of the time a well line may stand not demonstrated [default: 1 %]');
  act(window, (told) => {
    const lost = toldPart('lost', one(told, 'lost') ?? '1 %');
    if (told['side'] !== undefined) return meanWindow(told, lost);
    const text = line(told, 'a share of units, an amount over an exposure, or with --side a mean');
    const amount = amountOf(text);
    const wish = { line: amount === undefined ? toldShare('line', text) : amount.value / amount.per, tail: confidence(told), lost };
    if (amount === undefined) {
      const normal = oneOf(told, 'normal-rate', 'units', 'a window in units');
      return normal === undefined ? windowOf(wish, toldWhole('units', one(told, 'units') ?? '', 1, 1e9), countedUnits) : windowFor(wish, toldShare('normal-rate', normal), countedUnits);
    }
    const counted = countedExposure(amount);
    const normal = oneOf(told, 'normal-rate', 'exposure', `a window in ${amount.unit}`);
    return normal === undefined ? windowOf(wish, toldExposure('exposure', amount.unit, one(told, 'exposure') ?? ''), counted) : windowFor(wish, toldRateIn('normal-rate', amount.unit, normal), counted);
  });
}

function meanWindow(told: Told, lost: ReturnType<typeof toldPart>): PlanAnswer {
  const promise = { side: sideOf(told), line: toldNumber('line', line(told, 'a number in the unit of measure')) };
  const asked = { promise, process: sigmaOf(told), tail: confidence(told), lost, unit: one(told, 'unit') };
  const mean = oneOf(told, 'mean', 'units', 'a window in measurements');
  return mean === undefined ? meanWindowOf(asked, toldWhole('units', one(told, 'units') ?? '', 1, 1e12)) : meanWindowFor(asked, toldNumber('mean', mean));
}

/** What the line is like when it is well, unless the window is told, to which it is the answer. */
function oneOf(told: Told, normal: 'normal-rate' | 'mean', size: 'units' | 'exposure', what: string): string | undefined {
  const [asked, window] = [one(told, normal === 'mean' ? 'mean' : 'normalRate'), one(told, size)];
  if (asked !== undefined && window !== undefined) throw new CommandFault(`--${normal} and --${size}: give one; the other is the answer`);
  if (asked === undefined) required(size, window, `${what}, or --${normal} to have one proposed`);
  return asked;
}

function act(command: Command, answer: (told: Told) => PlanAnswer): void {
  command.action(async () => {
    const told = command.opts<Told>();
    printPlan(await planned({ normal: 'normal-rate', yieldLine: 'line', tail: 'confidence', nonconforming: 'allowed', marked: 'rate', mean: 'mean', n: 'units' }, () => answer(told)), told['json'] === true);
  });
}
