import { createHash } from 'node:crypto';
import type { SourceUploads } from '../../core/monitor/source-uploads.ts';
import type { SourceLedger } from '../../core/monitor/source-ledger.ts';
import type { Receipt } from '../../core/monitor/receipt.ts';
import type { SourceLimits } from '../../core/protocol/limits.ts';
import { refusalTable } from '../../core/protocol/refusals.ts';
import type { SetAside } from '../../core/protocol/source-messages.ts';
import type { Frame } from '../../core/record/part.ts';
import type { Refusal } from '../../core/record/refusal.ts';
import type { RowRecord } from '../../core/record/row.ts';
import { AllowedStations } from '../ingest/allowed-stations.ts';
import type { Arrival } from '../pipeline/arrival.ts';
import { frameBudget } from '../rows/frame-budget.ts';
import { framesOfRows } from '../rows/frames-of-rows.ts';
import { piecesOf } from '../../core/monitor/pieces-of.ts';
import type { RowForm } from '../rows/row-form.ts';
import { untilAborted } from '../rows/until-aborted.ts';
import type { UploadTurn } from './upload-desk.ts';
import { faultOfRow, faults } from './upload-fault.ts';

export interface UploadHost {
  /** @returns false if nothing is taken any more */
  readonly put: (arrival: Arrival) => boolean;
  readonly ledgerOf: (source: string) => SourceLedger;
  readonly limits: SourceLimits;
  readonly frameRead: (records: number) => void;
}

/** What an upload did so far. */
export interface UploadSums {
  /** Everything below is on disk. */
  readonly next: number;
  readonly taken: number;
  readonly repeated: number;
  /** The first of the reasons for which records are kept but not counted. */
  readonly setAside: readonly SetAside[];
}

const frameRecords = 5_000;
const idleMs = 200;
/** Frames of an upload that are judged and not yet durable: the body is not read on meanwhile. */
const mostWaiting = 8;
const mostListed = 100;

/** One upload: its rows become frames, in order, each judged before the next is cut. */
export class UploadRun {
  readonly #host: UploadHost;
  readonly #turn: UploadTurn;
  readonly #key: string | undefined;
  readonly #allowed: AllowedStations;
  readonly #waiting: Promise<unknown>[] = [];
  readonly #setAside: SetAside[] = [];
  /** Where the upload ended before, if other records came since: nothing is taken from there on. */
  #endedAt = Infinity;
  #taken = 0;
  #repeated = 0;

  constructor(host: UploadHost, turn: UploadTurn, key: string | undefined) {
    this.#host = host;
    this.#turn = turn;
    this.#key = key;
    this.#allowed = new AllowedStations(turn.sender);
  }

  get sums(): UploadSums {
    return { next: this.#ledger.next, taken: this.#taken, repeated: this.#repeated, setAside: this.#setAside };
  }

  /** Takes all rows; resolves when they are durable. @throws UploadFault */
  async take(text: AsyncIterator<Uint8Array>, form: RowForm): Promise<void> {
    const { limits } = this.#host;
    const frames = framesOfRows(untilAborted(text, this.#turn.signal), {
      form,
      rowBytes: limits.rowBytes,
      ...frameBudget(limits, frameRecords),
      idleMs,
      begin: (row) => this.#begin(row),
      refusalOf: (row, line) => this.#refusalOf(row, line),
    });
    try {
      for await (const one of frames) {
        if (one.kind === 'refused') throw faultOfRow(one.refusal);
        await this.#takeFrame(one.frame, one.line);
      }
    } finally {
      await Promise.allSettled(this.#waiting);
    }
    await Promise.all(this.#waiting);
  }

  get #ledger(): SourceLedger {
    return this.#host.ledgerOf(this.#turn.sender.name);
  }

  /** Sequence of the first row. */
  async #begin(row: RowRecord): Promise<number> {
    if (row.sequence !== undefined) return row.sequence;
    if (this.#key === undefined) throw faults.keyMissing(1);
    const mark = createHash('sha256').update(JSON.stringify(row)).digest('hex').slice(0, 16);
    await this.#turn.begin(this.#key, mark);
    return this.#position(this.#ledger.uploads, this.#key, mark);
  }

  #position(uploads: SourceUploads, key: string, mark: string): number {
    const upload = uploads.of(key);
    if (upload === undefined || upload.mark !== mark) throw faults.keyReused();
    if (uploads.running !== key) this.#endedAt = upload.next;
    return upload.first;
  }

  #refusalOf(row: RowRecord, line: number): Refusal | undefined {
    const refusal = this.#allowed.refusalOfRow(row);
    return refusal === undefined ? undefined : { ...refusal, line };
  }

  async #takeFrame(frame: Frame, line: number): Promise<void> {
    if (frame.first + frame.records > this.#endedAt) {
      this.#repeated += Math.max(0, this.#endedAt - frame.first);
      throw faults.superseded(this.#repeated);
    }
    for (const { kind, frame: piece } of piecesOf(this.#ledger, frame)) {
      if (kind === 'gap') throw faults.gap(line, piece.first, this.#ledger.next);
      if (kind === 'repeat') this.#repeated += piece.records;
      else await this.#put(piece);
    }
  }

  async #put(frame: Frame): Promise<void> {
    this.#host.frameRead(frame.records);
    const receipt = await this.#judged(frame);
    if (receipt.kind !== 'taken') throw faults.interrupted(); // Someone else sent for the source in between.
    this.#taken += receipt.frame.records;
    for (const { sequence, records, code } of receipt.notCounted) {
      if (this.#setAside.length < mostListed) this.#setAside.push({ sequence, records, code, sentence: refusalTable[code].sentence });
    }
    if (this.#waiting.length >= mostWaiting) await this.#waiting.shift();
  }

  /** Resolves when the frame is judged; that it is durable is waited for later. */
  #judged(frame: Frame): Promise<Receipt> {
    const { signal, sender } = this.#turn;
    return new Promise((resolveJudged, rejectJudged) => {
      const durable = new Promise<void>((resolve, reject) => {
        const fail = (): void => {
          reject(signal.reason as Error);
          rejectJudged(signal.reason as Error);
        };
        if (signal.aborted) return fail();
        signal.addEventListener('abort', fail, { once: true });
        const done = (): void => {
          signal.removeEventListener('abort', fail);
          resolve();
        };
        const taken = this.#host.put({ kind: 'frame', sender, frame, bytes: undefined, judged: resolveJudged, durable: done });
        if (!taken) reject(faults.stopping());
        if (!taken) rejectJudged(faults.stopping());
      });
      durable.catch(() => undefined); // Told where it is waited for, at the latest at the upload's end.
      this.#waiting.push(durable);
    });
  }
}
