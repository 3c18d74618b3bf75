import type { Finding, InspectionPart } from '../record/part.ts';
import type { RecordColumns } from './held-records.ts';
import { nonconformingPlaces } from './nonconforming-places.ts';

/** How an evidence reads its numbers from parts and findings; undefined for kinds it does not take. */
export interface RecordReader {
  readonly columns: (part: InspectionPart, from: number, to: number) => RecordColumns | undefined;
  readonly finding: (finding: Finding) => { readonly a: number; readonly b: number } | undefined;
}

/** Measured values; records of other kinds say nothing of a mean. */
export const measuredRecords: RecordReader = {
  columns: (part, from, to) => (part.kind === 'measurements' ? { a: part.value.subarray(from, to), b: undefined } : undefined),
  finding: (finding) => (finding.kind === 'measurement' ? { a: finding.value, b: 0 } : undefined),
};

/** Nonconformities and their exposure; units told as verdicts or tallies are an exposure of 1 each. */
export const exposedRecords: RecordReader = {
  columns: (part, from, to) => {
    switch (part.kind) {
      case 'exposures':
        return { a: part.count.subarray(from, to), b: part.exposure.subarray(from, to) };
      case 'tallies':
        return { a: part.nonconforming.subarray(from, to), b: part.inspected.subarray(from, to) };
      case 'verdicts': {
        const a = new Uint8Array(to - from);
        for (const place of nonconformingPlaces(part, from, to, undefined)) a[place - from] = 1;
        return { a, b: new Uint8Array(to - from).fill(1) };
      }
      case 'measurements':
        return undefined;
    }
  },
  finding: (finding) => {
    switch (finding.kind) {
      case 'exposure':
        return { a: finding.count, b: finding.exposure };
      case 'tally':
        return { a: finding.nonconforming, b: finding.inspected };
      case 'verdict':
        return { a: finding.nonconforming ? 1 : 0, b: 1 };
      case 'measurement':
        return undefined;
    }
  },
};
