import { latestMs } from '../units.ts';
import { checkedMoment } from './checked-words.ts';
import type { Correction, Exposures, Finding, Measurements, Origin, Tallies, Verdicts } from './part.ts';
import { refuse } from './refusal.ts';
import type { TimeColumn } from './time-column.ts';

/** Rules of inspection parts, said once for every form in which records arrive. Each refuses or returns the part. */

/** @param nonconforming places of the nonconforming units, strictly rising, each below `records` */
export function checkedVerdicts(origin: Origin, records: number, time: TimeColumn, nonconforming: Uint32Array): Verdicts {
  let least = 0;
  for (let i = 0; i < nonconforming.length; i += 1) {
    const place = nonconforming[i] as number;
    if (place < least || place >= records) {
      refuse('not-rising', `nonconforming[${i}]`, place, `a whole number from ${least} to ${records - 1}, above the one before`);
    }
    least = place + 1;
  }
  return { kind: 'verdicts', origin, records, time, nonconforming };
}

/** Nonconforming units that the tallies of one part may name together: each takes room in the windows. */
export const mostTallied = 65_536;

export function checkedTallies(origin: Origin, time: TimeColumn, inspected: Uint32Array, nonconforming: Uint32Array): Tallies {
  sameLength(nonconforming, inspected, 'nonconforming', 'inspected');
  let tallied = 0;
  for (let i = 0; i < inspected.length; i += 1) {
    const units = inspected[i] as number;
    const found = nonconforming[i] as number;
    tallied += found;
    if (units === 0) refuse('out-of-range', `inspected[${i}]`, 0, 'a whole number from 1 to 4,294,967,295');
    if (found > units) refuse('out-of-range', `nonconforming[${i}]`, found, `at most the ${units} inspected`);
    if (tallied > mostTallied) refuse('out-of-range', `nonconforming[${i}]`, found, `at most ${mostTallied} nonconforming units in the tallies of one part`);
  }
  return { kind: 'tallies', origin, records: inspected.length, time, inspected, nonconforming };
}

export function checkedExposures(origin: Origin, time: TimeColumn, count: Uint32Array, exposure: Float64Array): Exposures {
  sameLength(exposure, count, 'exposure', 'count');
  for (let i = 0; i < exposure.length; i += 1) {
    const size = exposure[i] as number;
    if (!(size > 0 && size < Infinity)) refuse('out-of-range', `exposure[${i}]`, size, 'a finite number above 0');
  }
  return { kind: 'exposures', origin, records: count.length, time, count, exposure };
}

export function checkedMeasurements(origin: Origin, time: TimeColumn, value: Float64Array): Measurements {
  for (let i = 0; i < value.length; i += 1) {
    const measured = value[i] as number;
    if (!Number.isFinite(measured)) refuse('out-of-range', `value[${i}]`, measured, 'a finite number');
  }
  return { kind: 'measurements', origin, records: value.length, time, value };
}

function sameLength(column: { length: number }, as: { length: number }, name: string, asName: string): void {
  if (column.length !== as.length) {
    refuse('wrong-length', name, column, `as many entries as ${asName}: ${as.length}`);
  }
}

/** @param records how many times the column must hold */
export function checkedTime(column: TimeColumn, records: number): TimeColumn {
  if (column.kind === 'each') {
    if (column.times.length !== records) refuse('wrong-length', 'time', column.times, `one time a record: ${records}`);
    for (let i = 0; i < records; i += 1) {
      const time = column.times[i] as number;
      if (!(time >= 0 && time <= latestMs && Math.floor(time) === time)) checkedMoment(time, `time[${i}]`);
    }
    return column;
  }
  const { start, step } = column;
  if (!(start >= 0 && start <= latestMs)) refuse('bad-time', 'time.start', start, 'milliseconds since 1970-01-01 UTC, up to the year 9999');
  if (!(step >= 0 && start + (records - 1) * step <= latestMs)) {
    refuse('bad-time', 'time.step', step, 'milliseconds, 0 or more, that keep the last record before the year 10000');
  }
  return column;
}

/** A finding as a re-inspection or a row states it; `place` stands before the field's name in a refusal. */
export function checkedFinding(finding: Finding, place = ''): Finding {
  switch (finding.kind) {
    case 'verdict':
      return finding;
    case 'tally': {
      const { inspected, nonconforming } = finding;
      if (inspected === 0) refuse('out-of-range', `${place}inspected`, inspected, 'a whole number from 1 to 4,294,967,295');
      if (nonconforming > inspected) refuse('out-of-range', `${place}nonconforming`, nonconforming, `at most the ${inspected} inspected`);
      if (nonconforming > mostTallied) refuse('out-of-range', `${place}nonconforming`, nonconforming, `at most ${mostTallied} nonconforming units in one tally`);
      return finding;
    }
    case 'exposure': {
      const { exposure } = finding;
      if (!(exposure > 0 && exposure < Infinity)) refuse('out-of-range', `${place}exposure`, exposure, 'a finite number above 0');
      return finding;
    }
    case 'measurement':
      if (!Number.isFinite(finding.value)) refuse('out-of-range', `${place}value`, finding.value, 'a finite number');
      return finding;
  }
}

/** A correction names a record before itself. */
export function checkedCorrection(correction: Correction, sequence: number): Correction {
  return correction.corrects < sequence
    ? correction
    : refuse('bad-correction', 'corrects', correction.corrects, `a sequence below its own, ${sequence}`);
}
