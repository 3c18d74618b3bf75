import type { Happening } from '../monitor/happening.ts';
import type { EvidenceState } from '../evidence/evidence-state.ts';

/** GET /api/guarantees/:id/history?from&to&points: bound and estimate over time, columns of one length, oldest first. */
export interface History {
  readonly guarantee: string;
  readonly from: number;
  readonly to: number;
  /** Start of each step, ms. */
  readonly at: readonly number[];
  readonly stepMs: number;
  /** Units (or exposure) and nonconforming units (or nonconformities) inspected within the step. */
  readonly inspected: readonly number[];
  readonly nonconforming: readonly number[];
  /** Of the window, at the end of the step; null where there was none. */
  readonly estimate: readonly (number | null)[];
  readonly bound: readonly (number | null)[];
  readonly opposite: readonly (number | null)[];
  readonly state: readonly EvidenceState[];
  /** Alarms, restarts, changes of the line, settings: on the same axis. */
  readonly events: readonly Happening[];
}

/** GET /api/guarantees/:id/strip: the units of the present window with every nonconforming one. */
export interface Strip {
  readonly guarantee: string;
  /** Units in the window, and units it holds when full (undefined where it has no size). */
  readonly units: number;
  readonly full: number | undefined;
  /** Place in the window, 0 = oldest; time of inspection where known. At most 5,000, the newest; `left` tells how many older ones are not listed. */
  readonly nonconforming: readonly { readonly place: number; readonly at: number | undefined; readonly source: string; readonly sequence: number }[];
  readonly left: number;
}

/** GET /api/guarantees/:id/picture: what suits the kind of guarantee. */
export type Picture =
  | { readonly kind: 'none' }
  | {
      readonly kind: 'distribution';
      readonly unit: string;
      /** Bin edges (n + 1) and counts (n) of the window's values. */
      readonly edges: readonly number[];
      readonly counts: readonly number[];
      readonly mean: number;
      readonly sd: number;
      readonly limit: { readonly side: 'below' | 'above'; readonly value: number } | undefined;
      /** Whether the normal model may be drawn and used, and the test that says so. */
      readonly model: { readonly verdict: 'fits' | 'does not fit' | 'too few values' | 'not used'; readonly sentence: string };
    }
  | {
      /** A window of time in equal parts, oldest first. */
      readonly kind: 'steps';
      /** Start of the first part, and length of each, ms. */
      readonly from: number;
      readonly stepMs: number;
      readonly inspected: readonly number[];
      readonly nonconforming: readonly number[];
    }
  | {
      readonly kind: 'stations';
      readonly stations: readonly { readonly id: string; readonly name: string; readonly inspected: number; readonly nonconforming: number; readonly yield: number; readonly limiting: boolean }[];
    };
