import { binaryOfFrame } from '../../core/protocol/binary-frame-writer.ts';
import type { RefusedFrame, ServerMessage, SetAside, Welcome } from '../../core/protocol/source-messages.ts';
import type { Frame } from '../../core/record/part.ts';
import { backoffMs, sourceBackoff, type BackoffRule } from './backoff.ts';
import { failureOf, SourceFailure } from './source-failure.ts';
import { SourceLink, type LinkEnd } from './source-link.ts';

/** What a client tells while it works. */
export type ClientEvent =
  /** The server greeted: at first, and after every break. */
  | { readonly kind: 'connected'; readonly welcome: Welcome }
  /** All records below `next` are on the server's disk; what of them is not counted is listed. */
  | { readonly kind: 'acknowledged'; readonly next: number; readonly setAside: readonly SetAside[] }
  | { readonly kind: 'broken'; readonly why: string; readonly retryMs: number }
  /** Nothing more will get through; told also when this side closed. */
  | { readonly kind: 'failed'; readonly failure: SourceFailure };

export interface SourceClientSetting {
  /** ws://host:port or wss://…; /source is where sources connect unless a path is given. */
  readonly address: URL;
  readonly token: string;
  /** Fail when nothing got through for so long, ms; Infinity keeps trying. */
  readonly giveUpMs: number;
  readonly backoff?: BackoffRule;
  /** A connection with frames in flight that says nothing for so long is given up for a new one, ms. */
  readonly quietMs?: number;
  readonly onEvent?: (event: ClientEvent) => void;
}

/** A frame that is kept until it is acknowledged: records `first` to `end` - 1. */
interface Kept {
  readonly first: number;
  readonly end: number;
  /** Its sequences were declared lost before: only an answer of its own says that it was taken, so it travels alone. */
  readonly late: boolean;
  readonly bytes: Uint8Array;
}

interface Waiter {
  readonly until: () => boolean;
  readonly resolve: () => void;
  readonly reject: (failure: SourceFailure) => void;
}

/**
 * A source's end of the record protocol. It keeps what it was given until the server has it on disk, never has more
 * in flight than granted, and after a break goes back to where the server's welcome says (go-back-N).
 */
export class SourceClient {
  readonly #setting: SourceClientSetting;
  #link: SourceLink | undefined;
  #welcome: Welcome | undefined;
  /** Whether the server greeted on the present connection. */
  #greeted = false;
  #next = 1;
  /** End of the newest frame given. */
  #given = 1;
  #kept: Kept[] = [];
  /** How many of the kept frames were sent on the present connection, and how many of those were refused. */
  #sent = 0;
  #refused = 0;
  /** A refusal of a frame's content: final as soon as what was sent before it is acknowledged. */
  #refusal: RefusedFrame | undefined;
  #failure: SourceFailure | undefined;
  #failedAttempts = 0;
  #troubleSince: number | undefined;
  #retryTimer: NodeJS.Timeout | undefined;
  #quietTimer: NodeJS.Timeout | undefined;
  #waiters: Waiter[] = [];

  constructor(setting: SourceClientSetting) {
    this.#setting = setting;
  }

  /** The server's newest greeting; undefined before the first. */
  get welcome(): Welcome | undefined {
    return this.#welcome;
  }

  /** All records below are on the server's disk. */
  get next(): number {
    return this.#next;
  }

  /** Frames given and not yet acknowledged. */
  get kept(): number {
    return this.#kept.length;
  }

  /** Connects. @throws SourceFailure */
  async open(): Promise<Welcome> {
    this.#troubleSince = performance.now();
    this.#connect();
    await this.#until(() => this.#welcome !== undefined);
    return this.#welcome as Welcome;
  }

  /**
   * Takes the next frame to send. It has to begin at or below where the one before ended, the first one at or below
   * the welcome's `next`; what the server has already it counts no second time. One that lies wholly below fills
   * what was declared lost.
   *
   * @returns resolves when another frame may be given; wait for it, or frames pile up here
   * @throws SourceFailure
   */
  send(frame: Frame): Promise<void> {
    const end = frame.first + frame.records;
    this.#kept.push({ first: frame.first, end, late: end <= this.#given, bytes: binaryOfFrame(frame) });
    this.#given = Math.max(this.#given, end);
    this.#pump();
    return this.#until(() => this.#kept.length < this.#window);
  }

  /** Resolves when everything given is acknowledged. @throws SourceFailure */
  settled(): Promise<void> {
    return this.#until(() => this.#kept.length === 0);
  }

  /** Ends the connection; whoever still waits is told that it is closed. */
  close(): void {
    this.#fail(new SourceFailure('closed', 'The connection was closed on this side before everything was acknowledged.'));
  }

  get #window(): number {
    return this.#welcome?.window ?? 1;
  }

  #connect(): void {
    const address = new URL(this.#setting.address);
    if (address.pathname === '/') address.pathname = '/source';
    this.#greeted = false;
    this.#link = new SourceLink(address, this.#setting.token, {
      heard: (message) => this.#heard(message),
      ended: (end) => this.#ended(end),
    });
  }

  #heard(message: ServerMessage): void {
    this.#quietTimer?.refresh();
    switch (message.type) {
      case 'welcome':
        this.#greet(message);
        break;
      case 'ack':
        this.#acknowledged(message.next, message.setAside ?? []);
        break;
      case 'refused':
        this.#refusedFrame(message);
        break;
      case 'stopping':
        break; // The close that follows is a break like any other.
    }
    this.#pump();
    this.#wake();
  }

  #greet(welcome: Welcome): void {
    if (this.#welcome === undefined) this.#next = this.#given = welcome.next;
    this.#welcome = welcome;
    this.#greeted = true;
    this.#sent = 0;
    this.#refused = 0;
    this.#refusal = undefined;
    if (this.#kept.length === 0) this.#tellSuccess();
    this.#setting.onEvent?.({ kind: 'connected', welcome });
    this.#acknowledged(welcome.next, []);
    const oldest = this.#kept[0];
    if (oldest !== undefined && welcome.next < oldest.first) {
      this.#fail(new SourceFailure('gap', `The server expects sequence ${welcome.next}, but the oldest record kept here is ${oldest.first}: the records between are missing.`));
    }
  }

  #acknowledged(next: number, setAside: readonly SetAside[]): void {
    let done = this.#sent > 0 && this.#kept[0]?.late === true ? 1 : 0;
    while (done < this.#kept.length && this.#isKnown(this.#kept[done] as Kept, next)) done += 1;
    this.#kept.splice(0, done);
    this.#sent = Math.max(0, this.#sent - done);
    if (done > 0) this.#tellSuccess();
    const known = this.#next;
    this.#next = next;
    if (next !== known || setAside.length > 0) this.#setting.onEvent?.({ kind: 'acknowledged', next, setAside });
    this.#failIfRefused();
  }

  #isKnown({ end, late }: Kept, next: number): boolean {
    return end <= next && !late;
  }

  /** What stands behind a refused frame is refused as a gap; a gap without one is settled by a new greeting. */
  #refusedFrame(refusal: RefusedFrame): void {
    this.#refused += 1;
    if (refusal.code !== 'sequence-gap') this.#refusal ??= refusal;
    else if (this.#refusal === undefined) this.#link?.break(refusal.sentence);
    this.#failIfRefused();
  }

  #failIfRefused(): void {
    if (this.#refusal !== undefined && this.#sent <= this.#refused) this.#fail(failureOf(this.#refusal));
  }

  #tellSuccess(): void {
    this.#failedAttempts = 0;
    this.#troubleSince = undefined;
  }

  /** Sends what the window has room for. */
  #pump(): void {
    if (!this.#greeted || this.#refusal !== undefined) return;
    while (this.#sent < Math.min(this.#kept.length, this.#window)) {
      const frame = this.#kept[this.#sent] as Kept;
      if (this.#sent > 0 && (frame.late || this.#kept[0]?.late === true)) break;
      this.#link?.send(frame.bytes);
      this.#sent += 1;
    }
    this.#watchForQuiet();
  }

  #watchForQuiet(): void {
    if (this.#sent === 0) {
      clearTimeout(this.#quietTimer);
      this.#quietTimer = undefined;
    } else this.#quietTimer ??= setTimeout(() => this.#link?.break('the server did not answer any more'), this.#setting.quietMs ?? 60_000);
  }

  #ended(end: LinkEnd): void {
    this.#greeted = false;
    this.#sent = 0;
    this.#watchForQuiet();
    if (end.kind === 'final') {
      this.#fail(end.failure);
      return;
    }
    const { giveUpMs, backoff = sourceBackoff, onEvent } = this.#setting;
    this.#troubleSince ??= performance.now();
    this.#failedAttempts += 1;
    const troubleMs = performance.now() - this.#troubleSince;
    const retryMs = Math.min(backoffMs(this.#failedAttempts, backoff, Math.random()), giveUpMs - troubleMs);
    if (retryMs <= 0) {
      this.#fail(new SourceFailure('gave-up', `Gave up after ${Math.round(troubleMs / 1000)} s without success: ${end.why}.`));
      return;
    }
    onEvent?.({ kind: 'broken', why: end.why, retryMs });
    if (this.#failure === undefined) this.#retryTimer = setTimeout(() => this.#connect(), retryMs);
  }

  #fail(failure: SourceFailure): void {
    if (this.#failure !== undefined) return;
    this.#failure = failure;
    clearTimeout(this.#retryTimer);
    clearTimeout(this.#quietTimer);
    this.#link?.close();
    this.#setting.onEvent?.({ kind: 'failed', failure });
    this.#wake();
  }

  #until(until: () => boolean): Promise<void> {
    return new Promise((resolve, reject) => {
      this.#waiters.push({ until, resolve, reject });
      this.#wake();
    });
  }

  #wake(): void {
    const waiting = this.#waiters;
    this.#waiters = [];
    for (const waiter of waiting) {
      if (this.#failure !== undefined) waiter.reject(this.#failure);
      else if (waiter.until()) waiter.resolve();
      else this.#waiters.push(waiter);
    }
  }
}
