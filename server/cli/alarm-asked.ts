import { violatedCount } from '../../core/bound/critical-count.ts';
import { violatedNonconformities } from '../../core/bound/critical-exposure.ts';
import { amountOf } from '../../core/figure/amount.ts';
import type { AlarmScene } from '../plan/alarm-plan.ts';
import type { AlarmRule } from '../plan/alarm-rule.ts';
import { cusumRule, detectorRule, windowRule } from '../plan/alarm-rules.ts';
import { countedExposure, countedUnits, type Counted } from '../plan/counted.ts';
import { meanDetectorRule } from '../plan/mean-alarm-rule.ts';
import { CommandFault } from './exit-codes.ts';
import { badOption, required, toldExposure, toldNumber, toldPart, toldRange, toldRateIn, toldTail, toldWhole } from './told-figures.ts';

/** What `vouchline plan alarm` was told, by option. */
export interface AlarmTold {
  readonly rule?: 'window' | 'cusum' | 'detector';
  readonly line?: string;
  readonly normalRate?: string;
  readonly worse?: readonly string[];
  readonly perDay?: string;
  readonly units?: string;
  readonly exposure?: string;
  readonly side?: 'at-least' | 'at-most';
  readonly mean?: string;
  readonly sigma?: string;
  readonly range?: string;
  readonly unit?: string;
  readonly count?: string;
  readonly confidence?: string;
  readonly batch?: string;
  readonly ratio?: string;
  readonly between?: string;
  readonly runs?: string;
  readonly json?: true;
}

/** An alarm setting and the line it is examined on. */
export interface AlarmAsked {
  readonly rule: AlarmRule;
  readonly scene: AlarmScene;
}

/** Makes of options what is asked: of units, of exposure, or of a mean where a side was told. @throws CommandFault; OutOfDomain */
export function alarmAsked(told: AlarmTold): AlarmAsked {
  const line = required('line', told.line, 'the rate (or mean) that the rule holds the line to');
  if (told.side !== undefined) return { rule: meanRuleOf(told, line, told.side), scene: meanSceneOf(told, line, told.side) };
  const stream = streamTold(line);
  return { rule: ruleOf(told, stream), scene: sceneOf(told, stream) };
}

/** What the rule holds the line to, and how that is told and said. */
interface StreamTold {
  readonly counted: Counted;
  /** guaranteed fraction, or rate per unit of exposure */
  readonly baseline: number;
  /** a rate in the same terms */
  readonly rate: (flag: string, text: string) => number;
  /** a size in the same terms: whole units, or exposure */
  readonly size: (flag: string, text: string) => number;
}

function streamTold(line: string): StreamTold {
  const amount = amountOf(line);
  if (amount === undefined) return { counted: countedUnits, baseline: toldPart('line', line), rate: toldPart, size: (flag, text) => toldWhole(flag, text, 1, 1e9) };
  const { value, per, unit } = amount;
  if (!(value > 0)) throw badOption('line', line, 'an amount above 0');
  return { counted: countedExposure(amount), baseline: value / per, rate: (flag, text) => positive(flag, text, toldRateIn(flag, unit, text)), size: (flag, text) => toldExposure(flag, unit, text) };
}

function positive(flag: string, text: string, value: number): number {
  if (value > 0) return value;
  throw badOption(flag, text, 'a rate above 0');
}

function sceneOf({ normalRate, worse, perDay }: AlarmTold, { counted, baseline, rate, size }: StreamTold): AlarmScene {
  const usual = [2, 3, 5, 10].map((times) => Number((times * baseline).toPrecision(12))).filter((at) => counted.grain !== 1 || at < 1);
  const normal = normalRate === undefined ? baseline : rate('normal-rate', normalRate);
  const rates = worse?.map((text) => rate('worse', text)) ?? usual;
  const better = rates.findIndex((at) => !(at > normal));
  if (better >= 0) throw badOption('worse', worse?.[better] ?? counted.rate(rates[better] ?? 0), `a rate above the normal rate ${counted.rate(normal)}`);
  return { normal, worse: rates, perDay: perDay === undefined ? undefined : size('per-day', perDay) };
}

const runsOf = ({ runs }: AlarmTold): number => toldWhole('runs', runs ?? '4000', 2, 1_000_000);

function ruleOf(told: AlarmTold, { counted, baseline, size }: StreamTold): AlarmRule {
  const between = (): number => toldNumber('between', required('between', told.between, `the wanted ${counted.grain === 1 ? 'units' : `exposure in ${counted.unit}`} between false calls`));
  const { rule, batch } = told;
  if (rule === undefined) throw new CommandFault('--rule is missing; expected window, cusum or detector');
  switch (rule) {
    case 'window': {
      const window = windowSize(told, counted, size);
      return windowRule(counted, { size: window, count: countOf(told, window, counted, baseline), batch: batch === undefined || batch === '1' ? undefined : size('batch', batch) }, runsOf(told));
    }
    case 'cusum':
      return cusumRule(counted, baseline, toldNumber('ratio', told.ratio ?? '2'), between());
    case 'detector':
      return detectorRule(counted, baseline, between(), runsOf(told));
  }
}

function windowSize({ units, exposure }: AlarmTold, { grain, unit }: Counted, size: StreamTold['size']): number {
  if (grain === 1) return toldWhole('units', required('units', units, 'the units in the window'), 2, 1e9);
  return size('exposure', required('exposure', exposure, `the exposure in the window, in ${unit}`));
}

function countOf({ count, confidence }: AlarmTold, size: number, { grain }: Counted, baseline: number): number {
  const units = grain === 1;
  if (count !== undefined && confidence !== undefined) throw new CommandFault('--count and --confidence: give one; the other follows');
  if (count !== undefined) return toldWhole('count', count, 1, units ? size : 1_000_000);
  const tail = toldTail('confidence', required('confidence', confidence, 'a confidence level, or --count'));
  const violated = units ? violatedCount(size, baseline, tail) : violatedNonconformities(size, baseline, tail);
  if (!units || violated <= size) return violated;
  throw badOption('units', String(size), 'a window large enough to show the line violated at this confidence');
}

function meanRuleOf(told: AlarmTold, line: string, side: 'at-least' | 'at-most'): AlarmRule {
  if (told.rule !== 'detector') throw badOption('rule', told.rule ?? 'nothing', 'detector: it is what watches a mean');
  const asked = {
    line: toldNumber('line', line),
    side,
    sigma: toldNumber('sigma', required('sigma', told.sigma, 'the standard deviation of the measurements')),
    range: told.range === undefined ? undefined : toldRange('range', told.range),
    between: toldNumber('between', required('between', told.between, 'the wanted measurements between false calls')),
    unit: told.unit,
  };
  return meanDetectorRule(asked, runsOf(told));
}

function meanSceneOf({ mean, worse, perDay, sigma }: AlarmTold, line: string, side: 'at-least' | 'at-most'): AlarmScene {
  const normal = toldNumber('mean', mean ?? line);
  const toBad = side === 'at-least' ? -1 : 1;
  const usual = [0.5, 1, 2, 3].map((steps) => Number((toldNumber('line', line) + toBad * steps * toldNumber('sigma', sigma ?? '')).toPrecision(12)));
  const means = worse?.map((text) => toldNumber('worse', text)) ?? usual;
  const better = means.findIndex((at) => !(toBad * (at - normal) > 0));
  if (better >= 0) throw badOption('worse', worse?.[better] ?? String(means[better]), `a mean ${side === 'at-least' ? 'below' : 'above'} the normal mean ${normal}`);
  return { normal, worse: means, perDay: perDay === undefined ? undefined : toldWhole('per-day', perDay, 1) };
}
