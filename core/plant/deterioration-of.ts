import { OutOfDomain } from '../bound/out-of-domain.ts';
import { cusumPlan } from '../run-length/cusum-run-length.ts';
import { fractionDetector, rateDetector } from '../sequential/detector-tuning.ts';
import type { AlarmsFile } from './alarm-schema.ts';
import { changeBaseline } from './change-baseline.ts';
import type { Complain } from './complain.ts';
import type { AlarmRule, Promised } from './guarantee.ts';
import type { Remedies } from './remedies-of.ts';
import type { Tail } from '../units.ts';

type DeteriorationFile = Exclude<NonNullable<AlarmsFile['deterioration']>, 'off'>;
type DetectorSettings = Pick<Extract<AlarmRule, { kind: 'deterioration' }>, 'unitsBetweenFalseCalls' | 'baseline' | 'detector'>;

interface Setting {
  readonly promise: Promised;
  readonly normalRate: number | undefined;
  readonly shared: number | undefined;
  readonly tail: Tail;
  readonly remedies: Remedies;
}

/** Units between false calls where neither the rule nor a budget of the plant says: the larger of these. */
const usualUnits = 1e6;
const usualFound = 1000;
/** Size of change a cumulative sum is tuned to. */
export const cusumRatio = 2;

/**
 * The detector of a guarantee: on wherever the quantity has one, against the guarantee line, with its units between
 * false calls from the rule, from the plant's budget, or by default a million or a thousand nonconforming ones at the
 * baseline, whichever is more.
 */
export function deteriorationOf(file: DeteriorationFile | undefined, setting: Setting, complain: Complain): DetectorSettings | undefined {
  const { promise, normalRate, shared, tail, remedies } = setting;
  const { baseline = 'line', detector = 'mixture' } = file ?? {};
  if (baseline === 'normal-rate' && normalRate === undefined) return void complain(['baseline'], 'line, or a normal-rate in the guarantee');
  const at = changeBaseline({ promise, tail, ...remedies }, baseline === 'normal-rate' ? normalRate : undefined);
  const { clusters } = remedies;
  if (clusters?.kind === 'design-effect' || clusters?.kind === 'lots') {
    return file && void complain([], `off: ${clusters.kind === 'lots' ? 'whole lots are too few for a change detector' : 'with a design-effect no distance between false calls is known'}; merge-within has one`);
  }
  const kind = kindOf(promise, at);
  if (typeof kind === 'string') return file && void complain([], kind);
  const units = file?.['units-between-false-calls'] ?? shared ?? defaultUnits(kind);
  if (units <= kind.least) {
    const more = `more than ${Math.floor(kind.least)}: with fewer the alarm could not return`;
    return void complain(['units-between-false-calls'], file?.['units-between-false-calls'] === undefined ? `${more}; the plant's budget of false calls leaves only ${Math.floor(units)}` : more);
  }
  if (detector === 'cusum' && !kind.fraction) return void complain(['detector'], 'mixture: the run length of a cumulative sum is known for units only');
  if (detector === 'cusum' && !cusumFits(at, units)) return void complain(['detector'], 'mixture: no cumulative sum has so many units between false calls at this baseline');
  return { unitsBetweenFalseCalls: units, baseline, detector };
}

interface DetectorKind {
  /** Units between false calls must be above this. */
  readonly least: number;
  readonly fraction: boolean;
  /** Nonconforming units (or nonconformities) a unit of size; undefined for a mean. */
  readonly rate: number | undefined;
}

/** What a quantity's detector asks for, or the words for why there is none. The alarm can return from three times the rest level on. */
function kindOf(promise: Promised, at: number): DetectorKind | string {
  switch (promise.quantity) {
    case 'nonconforming-fraction':
    case 'yield':
    case 'fraction-beyond-limit':
      if (!(at > 0 && at < 0.5)) return 'off, or a baseline above 0 and below 50 % nonconforming';
      return { least: 3 * fractionDetector(at, Number.MAX_VALUE).rest, fraction: true, rate: at };
    case 'rate':
      return at > 0 ? { least: 3 * rateDetector(at, Number.MAX_VALUE).rest, fraction: false, rate: at } : 'off, or a baseline above 0';
    case 'mean':
      if (!promise.sigma && !promise.range) return 'off, or a sigma or a range: without either no detector of a mean is known';
      if (promise.range && !(at > promise.range.from && at < promise.range.to)) return 'a baseline inside the range';
      return { least: 1, fraction: false, rate: undefined };
    case 'chained-yield':
    case 'lot-fraction':
      return `off: no detector is known for a ${promise.quantity}; watch the stations it lives on`;
  }
}

function defaultUnits({ rate, fraction }: DetectorKind): number {
  if (rate === undefined) return usualUnits;
  return Math.ceil(fraction ? Math.max(usualUnits, usualFound / rate) : usualFound / rate);
}

function cusumFits(baseline: number, units: number): boolean {
  try {
    cusumPlan(baseline, cusumRatio, units);
    return true;
  } catch (cause) {
    if (cause instanceof OutOfDomain) return false;
    throw cause;
  }
}
