import type { WebSocket } from 'ws';
import { Dashboard } from './dashboard.ts';
import type { Caller } from '../access/caller.ts';
import { mayDo } from '../../core/access/may-do.ts';
import { seesAll, type LiveBoard, type Sight } from './live-board.ts';

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

  /** @param caller who opened it: what it shows is what they may see */
  connect(socket: WebSocket, caller: Caller): void {
    const dashboard = new Dashboard(socket, this.#board, caller.by, sightOf(caller));
    this.#dashboards.add(dashboard);
    socket.on('close', () => this.#dashboards.delete(dashboard));
  }

  /** Ends the dashboards of a session, display or token that is over. */
  end(by: string): void {
    for (const dashboard of this.#dashboards) if (dashboard.by === by) dashboard.notSignedIn();
  }

  /** Ends those that were let in by something that has run out meanwhile. */
  endWhere(isOver: (by: string) => boolean): void {
    for (const dashboard of this.#dashboards) if (dashboard.by !== undefined && isOver(dashboard.by)) dashboard.notSignedIn();
  }

  /** @param wallNow ms, for beats */
  update(wallNow: number): void {
    for (const dashboard of this.#dashboards) dashboard.update(wallNow);
  }

  stop(reason: string): void {
    for (const dashboard of this.#dashboards) dashboard.stopping(reason);
  }
}

/** What a caller sees; those who see the same lines share their messages. */
function sightOf(caller: Caller): Sight {
  if (mayDo(caller, 'see', undefined)) return seesAll;
  const lines = [...new Set(caller.grants.flatMap(({ line }) => (line === undefined ? [] : [line])))].sort();
  return { key: JSON.stringify(lines), sees: (line) => line !== undefined && mayDo(caller, 'see', line) };
}
