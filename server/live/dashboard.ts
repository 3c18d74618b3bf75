import type { WebSocket } from 'ws';
import type { LiveBoard, Sight } from './live-board.ts';

/** A dashboard is sent to only when it has taken what was sent before: updates are skipped, never queued. */
const patientBytes = 0;
/** Wall time between beats while nothing changes, ms. */
const beatMs = 1_000;
/** A dashboard that takes nothing, or has not begun to watch, for this long is given up, ms. */
const frozenMs = 60_000;

/** One dashboard and the revision it has. */
export class Dashboard {
  readonly #socket: WebSocket;
  readonly #board: LiveBoard;
  #revision = -1;
  /** When it was sent to last, or first seen: wall time, ms. */
  #sentAt: number | undefined;
  #watching = false;

  /** Id of the session, display or token it was let in by; undefined where access is open. */
  readonly by: string | undefined;
  readonly #sight: Sight;

  constructor(socket: WebSocket, board: LiveBoard, by: string | undefined, sight: Sight) {
    this.#socket = socket;
    this.#board = board;
    this.by = by;
    this.#sight = sight;
    socket.on('message', (data) => this.#onWatch(data as Buffer));
  }

  /** Brings the dashboard up to date if it can take it. `wallNow`: ms, only for beats. */
  update(wallNow: number): void {
    if (this.#socket.readyState !== this.#socket.OPEN) return;
    this.#sentAt ??= wallNow;
    if (!this.#watching || this.#socket.bufferedAmount > patientBytes) {
      if (wallNow - this.#sentAt > frozenMs) this.#socket.terminate();
      return;
    }
    const { revision } = this.#board;
    if (this.#revision < revision) this.#send(this.#revision < 0 ? this.#board.snapshot(this.#sight) : this.#board.since(this.#revision, this.#sight), wallNow);
    else if (wallNow - this.#sentAt >= beatMs) this.#send(this.#board.beat(), wallNow);
    this.#revision = revision;
  }

  stopping(reason: string): void {
    if (this.#socket.readyState === this.#socket.OPEN) this.#socket.send(JSON.stringify({ type: 'stopping', reason }));
    this.#socket.close(1001, 'stopping');
  }

  /** What it was let in by holds no more. */
  notSignedIn(): void {
    this.#socket.close(4401, 'not-signed-in');
  }

  #send(message: string, wallNow: number): void {
    this.#socket.send(message);
    this.#sentAt = wallNow;
  }

  /** The first message says what the dashboard has; anything else asks for everything. */
  #onWatch(data: Buffer): void {
    this.#watching = true;
    this.#revision = knownRevision(data, this.#board.boot);
  }
}

/** The revision a dashboard may go on from: one of this very start of the server; -1 asks for a snapshot. */
function knownRevision(data: Buffer, boot: string): number {
  if (data.length > 1_024) return -1;
  try {
    const said = JSON.parse(data.toString('utf8')) as unknown;
    if (typeof said !== 'object' || said === null || !('boot' in said) || !('revision' in said)) return -1;
    return said.boot === boot && Number.isSafeInteger(said.revision) ? (said.revision as number) : -1;
  } catch {
    return -1; // Not JSON: a dashboard that cannot say what it has is sent everything.
  }
}
