import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { admitConforming, admitCounted, admitNonconforming, evidenceNow, type EvidenceRun, evidenceRunFrom, newEvidenceRun } from '../../../core/sequential/evidence-run.ts';
import { largestUnitsViolated, smallestUnitsDemonstrated } from '../../../core/sequential/nonconforming-critical.ts';
import { betaPriorAt, logEvidenceDemonstrated, logEvidenceViolated } from '../../../core/sequential/nonconforming-evidence.ts';
import { conformingUntilDemonstrated, nonconformingAffordable, nonconformingUntilViolated, unitsToDemonstrate } from '../../../core/sequential/run-margin.ts';
import { admitExposure, newRateRun, rateEvidenceNow, type RateRun, rateRunFrom } from '../../../core/sequential/rate-run.ts';
import type { Tail } from '../../../core/units.ts';

const line = 0.05;
const alpha = 0.05 as Tail;
const prior = betaPriorAt(line);
const thresholds = {
  sizeToDemonstrate: (count: number): number => smallestUnitsDemonstrated(count, line, alpha, prior),
  sizeViolated: (count: number): number => largestUnitsViolated(count, line, alpha, prior),
};

/** The run unit by unit, and the evidence itself at each: what the steps must come to. */
function unitByUnit(verdicts: readonly boolean[]): EvidenceRun {
  let run = newEvidenceRun;
  for (const conforming of verdicts) {
    const units = run.units + 1;
    const nonconforming = run.nonconforming + Number(!conforming);
    const enough = -Math.log(alpha);
    const demonstrated = logEvidenceDemonstrated(nonconforming, units, line, prior) >= enough;
    const violated = logEvidenceViolated(nonconforming, units, line, prior) >= enough;
    run = {
      units,
      nonconforming,
      demonstratedAt: run.demonstratedAt ?? (demonstrated ? units : undefined),
      violatedAt: run.violatedAt ?? (violated ? units : undefined),
    };
  }
  return run;
}

const gaps = fc.array(fc.integer({ min: 0, max: 120 }), { maxLength: 12 });

describe('a run of evidence', () => {
  it('is the same however the stream is cut, and as if every unit were looked at', () => {
    fc.assert(
      fc.property(gaps, fc.integer({ min: 0, max: 120 }), fc.integer({ min: 1, max: 50 }), (conforming, last, cut) => {
        let whole = newEvidenceRun;
        let pieces = newEvidenceRun;
        for (const gap of conforming) {
          whole = admitNonconforming(whole, gap, thresholds);
          for (let done = 0; done < gap; done += cut) pieces = admitConforming(pieces, Math.min(cut, gap - done), thresholds);
          pieces = evidenceRunRestored(admitNonconforming(pieces, 0, thresholds));
        }
        whole = admitConforming(whole, last, thresholds);
        pieces = admitConforming(pieces, last, thresholds);
        const verdicts = [...conforming.flatMap((gap) => [...Array.from({ length: gap }, () => true), false]), ...Array.from({ length: last }, () => true)];
        expect(pieces).toEqual(whole);
        expect(whole).toEqual(unitByUnit(verdicts));
      }),
      { seed: 1, numRuns: 60 },
    );
  });

  function evidenceRunRestored(run: EvidenceRun): EvidenceRun {
    const stored = evidenceRunFrom(JSON.parse(JSON.stringify(run)) as Partial<EvidenceRun>);
    return stored.ok ? stored.value : newEvidenceRun;
  }

  it('keeps what it once claimed while telling what stands now', () => {
    let run = admitConforming(newEvidenceRun, 90, thresholds);
    const first = thresholds.sizeToDemonstrate(0);
    expect(run.demonstratedAt).toBe(first);
    expect(evidenceNow(run, thresholds)).toBe('demonstrated');
    for (let i = 0; i < 4; i++) run = admitNonconforming(run, 0, thresholds);
    expect(run.demonstratedAt).toBe(first);
    expect(evidenceNow(run, thresholds)).toBe('open');
    for (let i = 0; i < 20; i++) run = admitNonconforming(run, 0, thresholds);
    expect(evidenceNow(run, thresholds)).toBe('violated');
    expect(run.violatedAt).toBeLessThan(run.units);
    expect(evidenceNow(newEvidenceRun, thresholds)).toBe('open');
  });

  it('looks once after a batch of which only counts are known', () => {
    const run = admitCounted(newEvidenceRun, 400, 2, thresholds);
    expect(run).toEqual({ units: 400, nonconforming: 2, demonstratedAt: 400, violatedAt: undefined });
    expect(admitCounted(newEvidenceRun, 20, 12, thresholds).violatedAt).toBe(20);
    expect(admitCounted(newEvidenceRun, 90, 0, thresholds)).toEqual(admitConforming(newEvidenceRun, 90, thresholds));
    expect(admitConforming(run, 0, thresholds)).toBe(run);
  });

  it('refuses a stored run that cannot be', () => {
    expect(evidenceRunFrom({ units: 5, nonconforming: 6 }).ok).toBe(false);
    expect(evidenceRunFrom({ units: 5 }).ok).toBe(false);
    expect(evidenceRunFrom({ units: 5.5, nonconforming: 1 }).ok).toBe(false);
    expect(evidenceRunFrom({ units: 5, nonconforming: 1, demonstratedAt: 9 }).ok).toBe(false);
  });
});

describe('the margin of a run', () => {
  it('counts to the very unit', () => {
    for (const counts of [{ units: 0, nonconforming: 0 }, { units: 400, nonconforming: 2 }, { units: 100, nonconforming: 9 }, { units: 20, nonconforming: 12 }]) {
      const { units, nonconforming } = counts;
      const wait = conformingUntilDemonstrated(counts, thresholds);
      const enough = -Math.log(alpha);
      expect(logEvidenceDemonstrated(nonconforming, units + wait, line, prior)).toBeGreaterThanOrEqual(enough);
      if (wait > 0) expect(logEvidenceDemonstrated(nonconforming, units + wait - 1, line, prior)).toBeLessThan(enough);
      const affordable = nonconformingAffordable(counts, thresholds);
      expect(affordable === undefined).toBe(wait > 0);
      if (affordable !== undefined) {
        expect(logEvidenceDemonstrated(nonconforming + affordable, units + affordable, line, prior)).toBeGreaterThanOrEqual(enough);
        expect(logEvidenceDemonstrated(nonconforming + affordable + 1, units + affordable + 1, line, prior)).toBeLessThan(enough);
      }
      const toViolated = nonconformingUntilViolated(counts, thresholds);
      expect(logEvidenceViolated(nonconforming + toViolated, units + toViolated, line, prior)).toBeGreaterThanOrEqual(enough);
      if (toViolated > 0) expect(logEvidenceViolated(nonconforming + toViolated - 1, units + toViolated - 1, line, prior)).toBeLessThan(enough);
    }
  });

  it('foresees the demonstration along the expected counts', () => {
    const start = { units: 0, nonconforming: 0 };
    expect(Math.ceil(unitsToDemonstrate(start, 0, line, alpha, prior))).toBe(thresholds.sizeToDemonstrate(0));
    const half = unitsToDemonstrate(start, line / 2, line, alpha, prior);
    expect(half).toBeGreaterThan(thresholds.sizeToDemonstrate(0));
    expect(unitsToDemonstrate({ units: 400, nonconforming: 2 }, line / 2, line, alpha, prior)).toBe(0);
    expect(unitsToDemonstrate(start, line, line, alpha, prior)).toBe(Infinity);
    expect(unitsToDemonstrate(start, NaN, line, alpha, prior)).toBe(Infinity);
  });
});

describe('a run of evidence on a rate', () => {
  const simple = { sizeToDemonstrate: (count: number): number => 10 + 5 * count, sizeViolated: (count: number): number => (count > 3 ? count : 0) };

  it('looks after every record and keeps what it claimed', () => {
    let run: RateRun = newRateRun;
    for (const [exposure, count] of [[6, 0], [5, 0], [1, 2]] as const) run = admitExposure(run, exposure, count, simple);
    expect(run).toEqual({ exposure: 12, count: 2, demonstratedAt: 11, violatedAt: undefined });
    expect(rateEvidenceNow(run, simple)).toBe('open');
    expect(rateEvidenceNow(admitExposure(run, 8, 0, simple), simple)).toBe('demonstrated');
    const ill = admitExposure(newRateRun, 3, 5, simple);
    expect(ill.violatedAt).toBe(3);
    expect(rateEvidenceNow(ill, simple)).toBe('violated');
    expect(rateRunFrom(JSON.parse(JSON.stringify(ill)) as Partial<RateRun>)).toEqual({ ok: true, value: ill });
    expect(rateRunFrom({ exposure: NaN, count: 0 }).ok).toBe(false);
    expect(rateRunFrom({ exposure: 1, count: -1 }).ok).toBe(false);
  });
});
