import type { WebSocket } from 'ws';
import { Dashboard } from './dashboard.ts';
import type { LiveBoard } from './live-board.ts';

/** All dashboards connected now. */
export class DashboardDesk {
  readonly #board: LiveBoard;
  readonly #dashboards = new Set<Dashboard>();

  constructor(board: LiveBoard) {
    this.#board = board;
  }

  get connected(): number {
    return this.#dashboards.size;
  }

  connect(socket: WebSocket): void {
    const dashboard = new Dashboard(socket, this.#board);
    this.#dashboards.add(dashboard);
    socket.on('close', () => this.#dashboards.delete(dashboard));
  }

  /** @param wallNow ms, for beats */
  update(wallNow: number): void {
    for (const dashboard of this.#dashboards) dashboard.update(wallNow);
  }

  stop(reason: string): void {
    for (const dashboard of this.#dashboards) dashboard.stopping(reason);
  }
}
