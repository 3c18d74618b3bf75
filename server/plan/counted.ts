import { writtenNumber } from '../../core/describe/rounded.ts';
import { briefShare } from '../../core/describe/share-text.ts';
import type { Amount } from '../../core/figure/amount.ts';

/** What an alarm setting counts, and how a person says it: nonconforming units among units, or nonconformities over exposure. */
export interface Counted {
  /** Exposure, in the plant's unit, of one of the pieces the arithmetic counts; 1 where it counts units. */
  readonly grain: number;
  /** 'nonconforming units', 'nonconformities' */
  readonly things: string;
  /** 'units', 'm': what lies between calls */
  readonly unit: string;
  /** a size in the plant's unit, rounded up: '10 000 units', '4600 m' */
  readonly size: (size: number) => string;
  /** a rate in the plant's unit: '200 ppm', '2 per 100 m' */
  readonly rate: (rate: number) => string;
}

/** Units, each of which conforms or does not. */
export const countedUnits: Counted = {
  grain: 1,
  things: 'nonconforming units',
  unit: 'units',
  size: (units) => `${writtenNumber(units, 15)} units`,
  rate: (rate) => briefShare(rate),
};

/** A piece of exposure is so short that it holds a nonconformity with this chance at the line: one piece with two is beyond any figure shown. */
const chanceOfPiece = 1e-7;

/** Exposure, over which nonconformities come at a rate. @param line guaranteed, value above 0 */
export function countedExposure({ value, per, unit }: Amount): Counted {
  return {
    grain: (chanceOfPiece * per) / value,
    things: 'nonconformities',
    unit,
    size: (exposure) => `${writtenNumber(exposure, 6, 'up')} ${unit}`,
    rate: (rate) => `${writtenNumber(rate * per, 4)} per ${per === 1 ? '' : `${per} `}${unit}`,
  };
}

/** Pieces in a size, whole. */
export const piecesOf = ({ grain }: Counted, size: number): number => Math.round(size / grain);
/** Chance that a piece holds one, at a rate. */
export const chanceAt = ({ grain }: Counted, rate: number): number => rate * grain;
