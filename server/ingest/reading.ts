import type { WebSocket } from 'ws';

/** Why a socket is not read for a while: the disk is behind, or its peer does not take the answers. */
export type HoldReason = 'disk' | 'answers';

/** Whether a socket is read: it is while no reason holds it. */
export class Reading {
  readonly #socket: Pick<WebSocket, 'pause' | 'resume'>;
  readonly #holds = new Set<HoldReason>();

  constructor(socket: Pick<WebSocket, 'pause' | 'resume'>) {
    this.#socket = socket;
  }

  hold(reason: HoldReason): void {
    if (this.#holds.size === 0) this.#socket.pause();
    this.#holds.add(reason);
  }

  release(reason: HoldReason): void {
    if (this.#holds.delete(reason) && this.#holds.size === 0) this.#socket.resume();
  }

  isHeldFor(reason: HoldReason): boolean {
    return this.#holds.has(reason);
  }

  /** For the flow control of all sources. */
  pause(): void {
    this.hold('disk');
  }

  resume(): void {
    this.release('disk');
  }
}
