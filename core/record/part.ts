import type { TimeColumn } from './time-column.ts';

/** Ids are the plant's own words: 1 to 64 characters, letters, digits and . _ - (no spaces), case kept. */
export type StationId = string;
export type LineId = string;
export type ProductId = string;
export type CharacteristicId = string;
export type LotId = string;

/** What all inspection records of one part have in common. */
export interface Origin {
  readonly station: StationId;
  readonly product: ProductId;
  readonly characteristic: CharacteristicId;
  readonly lot: LotId | undefined;
}

/** Verdicts of single units: only the nonconforming ones are listed, all others conform. */
export interface Verdicts {
  readonly kind: 'verdicts';
  readonly origin: Origin;
  /** Records in the part: units, 1 or more. */
  readonly records: number;
  readonly time: TimeColumn;
  /** Places of the nonconforming units in the part, 0 to records - 1, strictly rising. */
  readonly nonconforming: Uint32Array;
}

/** Tallies: each record says how many units were inspected and how many of them are nonconforming. */
export interface Tallies {
  readonly kind: 'tallies';
  readonly origin: Origin;
  readonly records: number;
  readonly time: TimeColumn;
  /** Units inspected, whole, 1 to 4,294,967,295 each. */
  readonly inspected: Uint32Array;
  /** Nonconforming units, 0 to inspected each. */
  readonly nonconforming: Uint32Array;
}

/** Nonconformities counted over an exposure (metres, square metres, hours, units) in the guarantee's own unit. */
export interface Exposures {
  readonly kind: 'exposures';
  readonly origin: Origin;
  readonly records: number;
  readonly time: TimeColumn;
  /** Nonconformities, whole, 0 or more each. */
  readonly count: Uint32Array;
  /** Exposure, finite, above 0 each. */
  readonly exposure: Float64Array;
}

/** Measured values of single units, in the characteristic's unit of measure; finite. */
export interface Measurements {
  readonly kind: 'measurements';
  readonly origin: Origin;
  readonly records: number;
  readonly time: TimeColumn;
  readonly value: Float64Array;
}

/** What a re-inspection found in place of what the corrected record said; same kind as that record. */
export type Finding =
  | { readonly kind: 'verdict'; readonly nonconforming: boolean }
  | { readonly kind: 'tally'; readonly inspected: number; readonly nonconforming: number }
  | { readonly kind: 'exposure'; readonly count: number; readonly exposure: number }
  | { readonly kind: 'measurement'; readonly value: number };

/** One re-inspected record of the same source: names the sequence it corrects and says why. */
export interface Correction {
  readonly kind: 'correction';
  readonly records: 1;
  readonly origin: Origin;
  readonly at: number;
  /** Sequence of the record it corrects: lower than its own. */
  readonly corrects: number;
  readonly finding: Finding;
  /** 1 to 500 characters, kept. */
  readonly reason: string;
}

/** Something that happened to a line, in the same order as the verdicts; one record each. */
export type LineMark =
  | { readonly kind: 'changeover'; readonly records: 1; readonly at: number; readonly line: LineId; readonly product: ProductId }
  | {
      readonly kind: 'lot-start';
      readonly records: 1;
      readonly at: number;
      readonly line: LineId;
      readonly product: ProductId;
      readonly lot: LotId;
      /** Units in the whole lot, where known. */
      readonly size: number | undefined;
    }
  | { readonly kind: 'lot-end'; readonly records: 1; readonly at: number; readonly line: LineId; readonly lot: LotId }
  | { readonly kind: 'line-stopped'; readonly records: 1; readonly at: number; readonly line: LineId; readonly reason: string }
  | { readonly kind: 'line-running'; readonly records: 1; readonly at: number; readonly line: LineId };

/** Records the source had to give up (an overrun buffer, say): their sequences are spent, their content is missing. */
export interface Lost {
  readonly kind: 'lost';
  readonly records: number;
  readonly at: number;
  /** Station whose records were lost. */
  readonly station: StationId;
  readonly reason: string;
}

export type InspectionPart = Verdicts | Tallies | Exposures | Measurements;
export type Part = InspectionPart | Correction | LineMark | Lost;

/** A frame as decoded: parts whose records are numbered on from `first`, in order. */
export interface Frame {
  /** Sequence of the first record; whole, 1 or more. */
  readonly first: number;
  /** Records in all parts together. */
  readonly records: number;
  readonly parts: readonly Part[];
}
