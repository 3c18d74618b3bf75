/** A socket that can be told to stop reading; its peer then feels TCP's back pressure. */
export interface Pausable {
  pause(): void;
  resume(): void;
}

/**
 * Stops reading all sources while more waits for the disk than `highBytes`, and goes on below `lowBytes`: what is
 * accepted stays bounded, and nothing accepted is dropped.
 */
export class Flow {
  readonly #sockets = new Set<Pausable>();
  readonly #highBytes: number;
  readonly #lowBytes: number;
  #paused = false;

  constructor(highBytes: number, lowBytes: number) {
    this.#highBytes = highBytes;
    this.#lowBytes = lowBytes;
  }

  get paused(): boolean {
    return this.#paused;
  }

  add(socket: Pausable): () => void {
    this.#sockets.add(socket);
    if (this.#paused) socket.pause();
    return () => this.#sockets.delete(socket);
  }

  /** Weighs what waits for the disk now. */
  weigh(waitingBytes: number): void {
    if (!this.#paused && waitingBytes > this.#highBytes) {
      this.#paused = true;
      for (const socket of this.#sockets) socket.pause();
    } else if (this.#paused && waitingBytes < this.#lowBytes) {
      this.#paused = false;
      for (const socket of this.#sockets) socket.resume();
    }
  }
}
