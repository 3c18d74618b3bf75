import type { Thresholds } from '../evidence/thresholds.ts';
import { fault, ok, type Result } from '../result.ts';
import { type OutOfRange, unitCount } from '../units.ts';

/** What a run of evidence on a rate remembers. Plain data; one look after every record. */
export interface RateRun {
  readonly exposure: number;
  readonly count: number;
  /** Exposure at which the guarantee was first seen demonstrated in this run. */
  readonly demonstratedAt: number | undefined;
  /** Exposure at which it was first seen violated. */
  readonly violatedAt: number | undefined;
}

/** A run at its declared beginning. */
export const newRateRun: RateRun = { exposure: 0, count: 0, demonstratedAt: undefined, violatedAt: undefined };

/**
 * The run with one record more. Records are admitted one by one: exposures added up beforehand would
 * round differently.
 *
 * @param exposure of this record, above 0
 * @param count nonconformities in it, whole, 0 or more
 */
export function admitExposure(run: RateRun, exposure: number, count: number, thresholds: Thresholds): RateRun {
  const total = run.exposure + exposure;
  const found = run.count + count;
  const demonstrated = total >= thresholds.sizeToDemonstrate(found);
  const violated = count > 0 && total <= thresholds.sizeViolated(found);
  return {
    exposure: total,
    count: found,
    demonstratedAt: run.demonstratedAt ?? (demonstrated ? total : undefined),
    violatedAt: run.violatedAt ?? (violated ? total : undefined),
  };
}

/** Whether the evidence as it stands now demonstrates the guarantee, violates it, or leaves it open. */
export function rateEvidenceNow(run: RateRun, thresholds: Thresholds): 'demonstrated' | 'violated' | 'open' {
  if (run.exposure >= thresholds.sizeToDemonstrate(run.count)) return 'demonstrated';
  return run.count > 0 && run.exposure <= thresholds.sizeViolated(run.count) ? 'violated' : 'open';
}

/** A stored run, checked. */
export function rateRunFrom(stored: Partial<RateRun>): Result<RateRun, OutOfRange> {
  const { exposure = NaN, demonstratedAt, violatedAt } = stored;
  const count = unitCount(stored.count ?? NaN, 'run count');
  if (!count.ok) return count;
  const latest = Math.max(demonstratedAt ?? 0, violatedAt ?? 0);
  if (exposure >= latest && exposure < Infinity) return ok({ exposure, count: count.value, demonstratedAt, violatedAt });
  return fault({ kind: 'out-of-range', what: 'run exposure', value: exposure, expected: `a finite number, ${latest} or more` });
}
