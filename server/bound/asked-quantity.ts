import type { BoundMethod } from '../../core/describe/bound-methods.ts';
import type { Given, Side } from './given.ts';
import type { Quantity } from './quantity.ts';

/** How a figure of this quantity is written for people. */
export type FigureScale = 'share' | 'rate' | 'measure' | 'units' | 'plain';

/** What a command takes beside the fields of its quantity. */
export type Beside =
  /** measurements from a column of a CSV file */
  | 'column'
  /** specification limits, which with mean and sd make up the distance or the index */
  | 'limits'
  /** a guarantee line to hold the bound against, where the quantity has none itself */
  | 'line'
  /** a unit of measure or of exposure, for the sentence */
  | 'unit';

/** A quantity as a person asks for it on the command line. */
export interface AskedQuantity {
  readonly command: string;
  readonly quantity: Quantity;
  readonly summary: string;
  /** the side a promise of this kind asks for; undefined where there is none, and for a mean, where it must be said */
  readonly usualSide: Side | undefined;
  /** on which side of the line a promise of this kind is kept; 'asked' where it is that of the bound */
  readonly promise: 'at most' | 'at least' | 'asked' | undefined;
  readonly scale: FigureScale;
  readonly beside: readonly Beside[];
  /** what was seen, as the sentence begins */
  readonly seen: (given: Given) => string;
  /** what the bound is on, with its article */
  readonly subject: (given: Given) => string;
  readonly method: (given: Given) => BoundMethod;
}
