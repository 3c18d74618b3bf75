import type { IncomingHttpHeaders } from 'node:http';
import type { Action } from '../../core/access/action.ts';
import { anybody, type Caller } from './caller.ts';

/** What a request shows of who sends it. */
export interface Shown {
  readonly headers: IncomingHttpHeaders;
  /** The client's address, as far as it is trusted. */
  readonly address: string;
}

/** Tells who asks, and keeps on record who was refused. */
export interface Guard {
  /** undefined: nobody known; what is open to all may still be asked. */
  callerOf(shown: Shown): Caller | undefined;
  /** Puts a refusal on record; there when it resolves, whether or not that went well. @param what the route or message */
  noteRefused(caller: Caller, action: Action, what: string): Promise<void>;
  /** Somebody who acts by PIN at a session or display did something. */
  noteActed(by: string): void;
}

/** Lets everybody do everything. */
export const openGuard: Guard = { callerOf: () => anybody, noteRefused: () => Promise.resolve(), noteActed: () => undefined };
