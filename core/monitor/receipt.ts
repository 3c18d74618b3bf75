import type { RefusalCode } from '../protocol/refusals.ts';
import type { Frame } from '../record/part.ts';

/** Records that were taken but are not counted. */
export interface NotCounted {
  readonly sequence: number;
  readonly records: number;
  readonly code: RefusalCode;
}

/** What became of a frame. Only a 'taken' one changed anything; its `frame` is what is to be kept, which is the frame or the one piece of it that was new. */
export type Receipt =
  | { readonly kind: 'taken'; readonly frame: Frame; readonly next: number; readonly notCounted: readonly NotCounted[] }
  | { readonly kind: 'repeated'; readonly next: number }
  | { readonly kind: 'gap'; readonly next: number };
