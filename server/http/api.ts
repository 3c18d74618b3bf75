import type { FastifyInstance } from 'fastify';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { Act, ActFault } from '../../core/monitor/act.ts';
import type { Watch } from '../../core/monitor/watch.ts';
import { stripOf } from '../../core/view/strip-of.ts';
import { viewOf } from '../../core/view/view-of.ts';
import { cardOf } from '../../core/view/card-of.ts';
import type { History, Picture, Strip } from '../../core/view/history.ts';
import type { Monitor } from '../../core/monitor/monitor.ts';
import type { HappeningFound, Store } from '../store/store.ts';
import { acknowledgeRequest, alarmParams, alarmsQuery, checked, eventsQuery, guaranteeParams, historyQuery, restartRequest } from './request-schemas.ts';

/** What the requests of people and programs are answered from. */
export interface ApiHost {
  readonly store: Store;
  readonly monitor: () => Monitor;
  /** Takes effect, is durable, then answers. */
  readonly act: (act: Act) => Promise<ActFault | undefined>;
}

/** Events drawn on one history chart at most. */
const mostEvents = 2_000;

class NotFound extends Error {
  readonly statusCode = 404;
}

class Conflict extends Error {
  readonly statusCode = 409;
}

/** The HTTP API under /api. */
export function serveApi(http: FastifyInstance, host: ApiHost): void {
  const watchOf = (params: unknown): Watch => {
    const { id } = checked(guaranteeParams, params);
    const watch = host.monitor().watches.find(({ guarantee }) => guarantee.id === id);
    if (!watch) throw new NotFound(`there is no guarantee "${id}"`);
    return watch;
  };

  http.get('/api/guarantees', () => host.monitor().watches.map((watch) => ({ card: cardOf(watch.guarantee, host.monitor().plant), view: viewOf(watch) })));

  http.get('/api/guarantees/:id/history', async (request): Promise<History> => {
    const { guarantee } = watchOf(request.params);
    const { from, to, points } = checked(historyQuery, request.query);
    const [steps, found] = await Promise.all([
      host.store.history({ guarantee: guarantee.id, from, to, points }),
      host.store.happenings({ from, to, limit: 10_000 }),
    ]);
    const mine = found.map(({ happening }) => happening).filter((one) => concerns(one, guarantee.id, guarantee.line));
    return { ...steps, events: mine.slice(0, mostEvents).reverse() };
  });

  http.get('/api/guarantees/:id/strip', (request): Strip => stripOf(watchOf(request.params)));

  http.get('/api/guarantees/:id/picture', (request): Picture => watchOf(request.params).evidence.picture?.() ?? { kind: 'none' });

  http.post('/api/guarantees/:id/restart', async (request) => {
    const { guarantee } = watchOf(request.params);
    const { by, reason } = checked(restartRequest, request.body);
    await host.act({ kind: 'restart', guarantee: guarantee.id, by, reason });
    return { restarted: guarantee.id };
  });

  http.get('/api/alarms', async (request): Promise<readonly Alarm[]> => {
    const { before, limit } = checked(alarmsQuery, request.query);
    return host.store.endedAlarms(before === undefined ? { limit } : { before, limit });
  });

  http.get('/api/alarms/standing', () => host.monitor().desk.standing());

  http.post('/api/alarms/:id/acknowledge', async (request) => {
    const { id } = checked(alarmParams, request.params);
    const { by, note } = checked(acknowledgeRequest, request.body);
    const fault = await host.act({ kind: 'acknowledge', alarm: id, by, note });
    if (fault === 'no-such-alarm') throw new NotFound(`there is no standing alarm ${id}`);
    if (fault !== undefined) throw new Conflict(`alarm ${id} is acknowledged already`);
    return { acknowledged: id };
  });

  http.get('/api/events', async (request): Promise<readonly HappeningFound[]> => {
    const { guarantee, before, ...rest } = checked(eventsQuery, request.query);
    return host.store.happenings({ ...rest, ...(guarantee === undefined ? {} : { guarantee }), ...(before === undefined ? {} : { before }) });
  });
}

/** Events on a guarantee's time axis: its alarms, its restarts, and what its line said of itself. */
function concerns(one: HappeningFound['happening'], guarantee: string, line: string): boolean {
  switch (one.kind) {
    case 'alarm':
      return one.alarm.guarantee === guarantee;
    case 'restart':
    case 'evidence':
      return one.guarantee === guarantee;
    case 'line':
      return one.line === line;
    case 'set-aside':
      return false;
  }
}
