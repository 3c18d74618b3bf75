import type { RefusalCode } from '../protocol/refusals.ts';
import type { Hole } from './source-ledger.ts';
import type { Frame } from '../record/part.ts';

/** Records that were taken but are not counted. */
export interface NotCounted {
  readonly sequence: number;
  readonly records: number;
  readonly code: RefusalCode;
}

/** What became of a frame. Only a 'taken' one changed anything; its `frame` is what is to be kept (a known head cut off). */
export type Receipt =
  | { readonly kind: 'taken'; readonly frame: Frame; readonly next: number; readonly notCounted: readonly NotCounted[] }
  | { readonly kind: 'repeated'; readonly next: number }
  | { readonly kind: 'partly-late'; readonly next: number; readonly hole: Hole }
  | { readonly kind: 'gap'; readonly next: number };
