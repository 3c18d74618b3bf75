import type { Monitor } from '../../core/monitor/monitor.ts';
import type { Act } from '../../core/monitor/act.ts';
import type { Sender } from '../pipeline/arrival.ts';
import { faults, type UploadFault } from './upload-fault.ts';

/** One upload's turn: while it lasts no other of its source runs. */
export interface UploadTurn {
  readonly sender: Sender;
  /** Given when the upload has to end; the reason is an UploadFault. */
  readonly signal: AbortSignal;
  /** From here on the records of the source are the upload's, until it ends. */
  begin(key: string, mark: string): Promise<void>;
  end(): void;
}

interface Running {
  readonly turn: UploadTurn;
  readonly abort: (why: UploadFault) => void;
}

export interface UploadDeskSetting {
  readonly monitor: () => Monitor;
  /** Puts an act in its place in the order of all arrivals at once; resolves when it is durable. */
  readonly act: (act: Act) => Promise<unknown>;
  readonly isConnected: (sender: Sender) => boolean;
  readonly onError: (cause: Error) => void;
}

/** The uploads that run, one a source. */
export class UploadDesk {
  readonly #setting: UploadDeskSetting;
  readonly #running = new Map<number, Running>();
  #closed: (() => UploadFault) | undefined;

  constructor(setting: UploadDeskSetting) {
    this.#setting = setting;
  }

  /** Ends what ran when an earlier server went down; to be called before anything is taken. */
  async endCutOff(): Promise<void> {
    const { monitor, act } = this.#setting;
    for (const { name, uploads } of monitor().sources.snapshot()) {
      if (uploads?.running !== undefined) await act({ kind: 'upload-ended', source: name });
    }
  }

  /** @throws UploadFault where another connection or upload of the source runs, or the server stops */
  turnOf(sender: Sender): UploadTurn {
    if (this.#closed !== undefined) throw this.#closed();
    if (this.#running.has(sender.id) || this.#setting.isConnected(sender)) throw faults.busy();
    const controller = new AbortController();
    let keyed = false;
    const turn: UploadTurn = {
      sender,
      signal: controller.signal,
      begin: async (key, mark) => {
        keyed = true;
        await this.#setting.act({ kind: 'upload-begun', source: sender.name, key, mark });
      },
      end: () => {
        if (this.#running.get(sender.id)?.turn !== turn) return;
        this.#running.delete(sender.id);
        if (keyed) this.#setting.act({ kind: 'upload-ended', source: sender.name }).catch((cause: unknown) => this.#setting.onError(cause as Error));
      },
    };
    this.#running.set(sender.id, { turn, abort: (why) => controller.abort(why) });
    return turn;
  }

  /** The source connects: its records are no longer the upload's. */
  interrupt(sender: Sender): void {
    this.#end(sender.id, faults.interrupted());
  }

  /** No upload is taken any more, and those that run end. */
  close(why: 'stopping' | 'notStored'): void {
    this.#closed = faults[why];
    for (const id of [...this.#running.keys()]) this.#end(id, faults[why]());
  }

  #end(id: number, why: UploadFault): void {
    const running = this.#running.get(id);
    running?.turn.end();
    running?.abort(why);
  }
}
