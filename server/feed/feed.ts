import { SourceLedger } from '../../core/monitor/source-ledger.ts';
import type { SetAside, Welcome } from '../../core/protocol/source-messages.ts';
import type { Frame } from '../../core/record/part.ts';
import type { RowRecord } from '../../core/record/row.ts';
import { frameBudget } from '../rows/frame-budget.ts';
import { framesOfRows } from '../rows/frames-of-rows.ts';
import { piecesOf } from '../../core/monitor/pieces-of.ts';
import { untilAborted } from '../rows/until-aborted.ts';
import { SourceClient, type ClientEvent } from './source-client.ts';
import { SourceFailure } from './source-failure.ts';

export interface FeedSetting {
  readonly address: URL;
  readonly token: string;
  /** Sequence of the first row, for one that states none; undefined: the one the server expects next. */
  readonly first: number | undefined;
  readonly giveUpMs: number;
  /** Records of a frame at most. */
  readonly frameRecords: number;
}

/** What a feed has done so far. */
export interface FeedSums {
  readonly source: string | undefined;
  /** Sequence of the first row; undefined before it. */
  readonly first: number | undefined;
  /** Whether the rows got their sequences here. */
  readonly numbered: boolean;
  /** Everything below is on the server's disk. */
  readonly next: number;
  readonly sent: number;
  /** Records of the text that the server had already. */
  readonly repeated: number;
  readonly setAside: number;
  /** The first reasons for which records are set aside, as the server said them. */
  readonly listed: readonly SetAside[];
  readonly breaks: number;
  readonly seconds: number;
}

/** What a feed tells while it works: what its connection does, and which sequence the first row has. */
export type FeedEvent = ClientEvent | { readonly kind: 'begun'; readonly first: number; readonly numbered: boolean };

/** Reasons kept for the summary. */
const mostListed = 100;
/** Rows do not wait longer for others to fill their frame, ms. */
const idleMs = 200;

/** Sends the rows of one text to a server, each once, whatever happens to the connection. */
export class Feed {
  readonly #setting: FeedSetting;
  readonly #client: SourceClient;
  /** What the server knows, once everything given is acknowledged. */
  readonly #ledger = new SourceLedger();
  readonly #listed: SetAside[] = [];
  readonly #failed = new AbortController();
  #onEvent: ((event: FeedEvent) => void) | undefined;
  #began = performance.now();
  #first: number | undefined;
  #numbered = false;
  #sent = 0;
  #repeated = 0;
  #setAside = 0;
  #breaks = 0;

  constructor(setting: FeedSetting) {
    this.#setting = setting;
    const { address, token, giveUpMs } = setting;
    this.#client = new SourceClient({ address, token, giveUpMs, onEvent: (event) => this.#note(event) });
  }

  get sums(): FeedSums {
    return {
      source: this.#client.welcome?.source,
      first: this.#first,
      numbered: this.#numbered,
      next: this.#client.next,
      sent: this.#sent,
      repeated: this.#repeated,
      setAside: this.#setAside,
      listed: this.#listed,
      breaks: this.#breaks,
      seconds: (performance.now() - this.#began) / 1000,
    };
  }

  /** Told what happens, from then on. */
  watch(onEvent: (event: FeedEvent) => void): void {
    this.#onEvent = onEvent;
  }

  /** Ends the run; `run` then fails as closed. */
  stop(): void {
    this.#client.close();
  }

  /** Sends everything; resolves when it is on the server's disk. @throws SourceFailure, with the line where a row is at fault */
  async run(text: AsyncIterator<Uint8Array>): Promise<void> {
    this.#began = performance.now();
    try {
      const welcome = await this.#client.open();
      this.#ledger.advance(welcome.next);
      await this.#sendAll(text, welcome);
    } finally {
      this.#client.close();
    }
  }

  async #sendAll(text: AsyncIterator<Uint8Array>, { limits, next }: Welcome): Promise<void> {
    const { records, parts } = frameBudget(limits, this.#setting.frameRecords);
    const frames = framesOfRows(untilAborted(text, this.#failed.signal), { form: undefined, rowBytes: limits.rowBytes, records, parts, idleMs, begin: (row) => this.#begin(row, next) });
    for await (const one of frames) {
      if (one.kind === 'frame') await this.#send(one.frame, one.line);
      else {
        await this.#client.settled();
        const { sentence, code, line } = one.refusal;
        throw new SourceFailure('refused', `${sentence} (${code}) What stands before it was sent.`, { line: line ?? 1 });
      }
    }
    await this.#client.settled();
  }

  #begin(row: RowRecord, next: number): number {
    const { first } = this.#setting;
    if (row.sequence !== undefined && first !== undefined) {
      throw new SourceFailure('refused', `The rows state their sequences (the first ${row.sequence}): leave out the first sequence given, ${first}.`);
    }
    if (first !== undefined && first > next) throw new SourceFailure('gap', `The first sequence given is ${first}, but the server expects ${next}: it has not seen a run that began there.`);
    this.#numbered = row.sequence === undefined;
    this.#first = row.sequence ?? first ?? next;
    this.#onEvent?.({ kind: 'begun', first: this.#first, numbered: this.#numbered });
    return this.#first;
  }

  /** Sends of a frame what the server does not have, each piece as it belongs in the source's order. */
  async #send(frame: Frame, line: number): Promise<void> {
    for (const piece of piecesOf(this.#ledger, frame)) {
      const { first, records } = piece.frame;
      switch (piece.kind) {
        case 'gap':
          await this.#client.settled();
          throw new SourceFailure('gap', `sequence is ${first}; expected ${this.#ledger.next}, or a lost row that spends those between. What stands before it was sent.`, { line });
        case 'repeat':
          this.#repeated += records;
          if (this.#ledger.place(first, records).kind === 'repeat') this.#noteLost(piece.frame);
          break;
        case 'late':
          this.#ledger.fill(first, records);
          await this.#give(piece.frame);
          break;
        case 'new':
          this.#noteLost(piece.frame);
          this.#ledger.advance(first + records);
          await this.#give(piece.frame);
      }
    }
  }

  #give(frame: Frame): Promise<void> {
    this.#sent += frame.records;
    return this.#client.send(frame);
  }

  /** Rows may fill later what others declared lost. */
  #noteLost(frame: Frame): void {
    let sequence = frame.first;
    for (const part of frame.parts) {
      if (part.kind === 'lost') this.#ledger.declareLost(sequence, part.records);
      sequence += part.records;
    }
  }

  #note(event: ClientEvent): void {
    if (event.kind === 'broken') this.#breaks += 1;
    else if (event.kind === 'failed') this.#failed.abort(event.failure);
    else if (event.kind === 'acknowledged') {
      for (const one of event.setAside) {
        this.#setAside += one.records;
        if (this.#listed.length < mostListed) this.#listed.push(one);
      }
    }
    this.#onEvent?.(event);
  }
}
