import type { Act, ActFault } from '../../core/monitor/act.ts';
import type { Receipt } from '../../core/monitor/receipt.ts';
import type { Frame } from '../../core/record/part.ts';

/** Who sent a frame, as the store's register knows it. */
export interface Sender {
  readonly id: number;
  readonly name: string;
  readonly stations: readonly string[];
  /** Products it may send for; empty or absent: every product. */
  readonly products?: readonly string[];
  /** Hash of the token it came by, hexadecimal: its connection ends with it. */
  readonly tokenHash?: string;
}

/** Something that comes in from outside and is to be judged, in the order in which it came. */
export type Arrival =
  | {
      readonly kind: 'frame';
      readonly sender: Sender;
      readonly frame: Frame;
      /** The frame's binary form where it came in it; made when it is kept otherwise. */
      readonly bytes: Uint8Array | undefined;
      /** Told once the frame is judged, before it is durable. */
      readonly judged: (receipt: Receipt, frame: Frame) => void;
      /** Told once the frame is durable (or was before). */
      readonly durable: (receipt: Receipt) => void;
    }
  | { readonly kind: 'refused'; readonly sender: Sender; readonly frames: number }
  | { readonly kind: 'act'; readonly act: Act; readonly done: (fault: ActFault | undefined) => void }
  | { readonly kind: 'plant'; readonly text: string; readonly version: string; /** Who puts it in force, and why. */ readonly who: string; readonly why: string; readonly done: () => void }
  /** Told when everything that came before it is durable. */
  | { readonly kind: 'barrier'; readonly done: () => void }
  | { readonly kind: 'tick' };

/** Nobody waits to be told. */
export const untold = (): void => undefined;
