import type { Thresholds } from '../evidence/thresholds.ts';
import { fault, ok, type Result } from '../result.ts';
import { type OutOfRange, unitCount } from '../units.ts';

/**
 * What a run of evidence on a fraction remembers, from its declared beginning on. Plain data: it is
 * stored and read back as it stands. A claim that was once reached stays valid for the run, so the
 * moment it was first reached is kept; whether it still stands follows from the counts.
 */
export interface EvidenceRun {
  readonly units: number;
  readonly nonconforming: number;
  /** Units at which the guarantee was first demonstrated in this run. */
  readonly demonstratedAt: number | undefined;
  /** Units at which it was first violated. */
  readonly violatedAt: number | undefined;
}

/** A run at its declared beginning: a lot, a product change, a repair. */
export const newEvidenceRun: EvidenceRun = {
  units: 0, nonconforming: 0, demonstratedAt: undefined, violatedAt: undefined,
};

/**
 * The run with conforming units more, in one step however many.
 *
 * @param conforming whole, 0 or more
 */
export function admitConforming(run: EvidenceRun, conforming: number, thresholds: Thresholds): EvidenceRun {
  if (conforming === 0) return run;
  const units = run.units + conforming;
  const first = run.demonstratedAt ?? reached(thresholds.sizeToDemonstrate(run.nonconforming), units);
  return { ...run, units, demonstratedAt: first };
}

/**
 * The run with conforming units and then a nonconforming one, in one step. The demonstration is
 * looked at before the nonconforming unit, the violation after it: there they are strongest.
 *
 * @param conforming whole, 0 or more
 */
export function admitNonconforming(run: EvidenceRun, conforming: number, thresholds: Thresholds): EvidenceRun {
  return looked(admitConforming(run, conforming, thresholds), 1, 1, thresholds);
}

/**
 * The run with a batch of which only counts are known: one look, after the batch.
 *
 * @param units whole, 0 or more
 * @param nonconforming whole, 0 to units
 */
export function admitCounted(run: EvidenceRun, units: number, nonconforming: number, thresholds: Thresholds): EvidenceRun {
  if (nonconforming === 0) return admitConforming(run, units, thresholds);
  return looked(run, units, nonconforming, thresholds);
}

/** Whether the evidence as it stands now demonstrates the guarantee, violates it, or leaves it open. */
export function evidenceNow(run: EvidenceRun, thresholds: Thresholds): 'demonstrated' | 'violated' | 'open' {
  if (run.units >= thresholds.sizeToDemonstrate(run.nonconforming)) return 'demonstrated';
  return run.nonconforming > 0 && run.units <= thresholds.sizeViolated(run.nonconforming) ? 'violated' : 'open';
}

/** A stored run, checked. */
export function evidenceRunFrom(stored: Partial<EvidenceRun>): Result<EvidenceRun, OutOfRange> {
  const units = unitCount(stored.units ?? NaN, 'run units');
  if (!units.ok) return units;
  const nonconforming = unitCount(stored.nonconforming ?? NaN, 'run nonconforming');
  if (!nonconforming.ok) return nonconforming;
  const { demonstratedAt, violatedAt } = stored;
  const latest = Math.max(nonconforming.value, demonstratedAt ?? 0, violatedAt ?? 0);
  if (latest <= units.value) return ok({ units: units.value, nonconforming: nonconforming.value, demonstratedAt, violatedAt });
  return fault({ kind: 'out-of-range', what: 'stored run', value: latest, expected: `at most its ${units.value} units` });
}

function looked(run: EvidenceRun, more: number, found: number, thresholds: Thresholds): EvidenceRun {
  const units = run.units + more;
  const nonconforming = run.nonconforming + found;
  const violated = units <= thresholds.sizeViolated(nonconforming);
  return {
    units,
    nonconforming,
    demonstratedAt: run.demonstratedAt ?? (units >= thresholds.sizeToDemonstrate(nonconforming) ? units : undefined),
    violatedAt: run.violatedAt ?? (violated ? units : undefined),
  };
}

function reached(threshold: number, units: number): number | undefined {
  return units >= threshold ? threshold : undefined;
}
