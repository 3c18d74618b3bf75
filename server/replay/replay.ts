import { Monitor, type Decisions } from '../../core/monitor/monitor.ts';
import type { Plant } from '../../core/plant/plant.ts';
import type { Frame } from '../../core/record/part.ts';
import { piecesOf } from '../../core/monitor/pieces-of.ts';

/** What a replay has seen. */
export interface ReplaySums {
  readonly records: number;
  /** Records that were known already, and records that the plant file has no place for. */
  readonly repeated: number;
  readonly setAside: number;
}

/** Frames were sent out of order: the sequence that was expected. */
export interface ReplayGap {
  readonly expected: number;
}

/** Runs the frames of one source through the same core as the server, the plant clock following the records. */
export class Replay {
  readonly monitor: Monitor;
  readonly #source: string;
  #records = 0;
  #repeated = 0;
  #setAside = 0;

  constructor(plant: Plant, plantVersion: string, source: string) {
    this.monitor = new Monitor(plant, plantVersion);
    this.#source = source;
  }

  get sums(): ReplaySums {
    return { records: this.#records, repeated: this.#repeated, setAside: this.#setAside };
  }

  /** The first frame begins here, whatever came before it in another file. @param first 1 or more */
  begin(first: number): void {
    this.monitor.sources.of(this.#source).ledger.advance(first);
  }

  /** @returns what the frame made happen, in order, or why it was not taken */
  take(frame: Frame): Decisions | ReplayGap {
    for (const piece of piecesOf(this.monitor.sources.of(this.#source).ledger, frame)) {
      if (piece.kind === 'repeat') {
        this.#repeated += piece.frame.records;
        continue;
      }
      const receipt = this.monitor.takeFrame(this.#source, piece.frame, undefined);
      if (receipt.kind !== 'taken') return { expected: receipt.next };
      this.#records += receipt.frame.records;
      for (const { records } of receipt.notCounted) this.#setAside += records;
    }
    return this.monitor.decisions();
  }
}
