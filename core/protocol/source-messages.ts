import type { Refusal } from '../record/refusal.ts';
import type { SourceLimits } from './limits.ts';
import type { RefusalCode } from './refusals.ts';

/** Subprotocol of the sources' WebSocket at /source; the number is the protocol's version. */
export const sourceProtocol = 'vouchline-source.1';

/** First message of the server: who the token says the source is, and where to go on. */
export interface Welcome {
  readonly type: 'welcome';
  readonly protocol: typeof sourceProtocol;
  readonly source: string;
  /** The next expected sequence: everything below it is durable. */
  readonly next: number;
  /** Frames the source may have in flight: sent, not acknowledged. */
  readonly window: number;
  readonly limits: SourceLimits;
  /** The server's clock, ms since 1970-01-01 UTC. */
  readonly at: number;
}

/** Records that are durable but not counted, and why. */
export interface SetAside {
  /** Sequence of the first of them. */
  readonly sequence: number;
  readonly records: number;
  readonly code: RefusalCode;
  readonly sentence: string;
}

/** All records below `next` are durable; one ack may answer several frames. */
export interface Ack {
  readonly type: 'ack';
  readonly next: number;
  readonly setAside?: readonly SetAside[];
}

/** A frame was not taken (or the connection ends: see the code's effect). */
export interface RefusedFrame {
  readonly type: 'refused';
  readonly code: RefusalCode;
  readonly sentence: string;
  /** First sequence of the frame, where it could be read. */
  readonly first?: number;
  readonly field?: string;
  readonly value?: string;
  readonly expected?: string;
  /** The next expected sequence: go on from here. */
  readonly next?: number;
}

/** The server is about to close on purpose; what is not acknowledged by then is to be sent again later. */
export interface Stopping {
  readonly type: 'stopping';
  readonly reason: string;
}

export type ServerMessage = Welcome | Ack | RefusedFrame | Stopping;

/** The message for a frame that a reader refused. */
export function refusedMessage(refusal: Refusal, next: number): RefusedFrame {
  const { code, sentence, field, value, expected } = refusal;
  return { type: 'refused', code, sentence, ...(field === '' ? {} : { field }), value, expected, next };
}

/** The message for a frame that begins after the next expected sequence. */
export function gapMessage(first: number, next: number): RefusedFrame {
  return {
    type: 'refused', code: 'sequence-gap', first, field: 'first', value: String(first), expected: String(next), next,
    sentence: `The frame begins at ${first}; expected ${next}. Send again from there, or declare what is lost.`,
  };
}
