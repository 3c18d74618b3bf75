import * as v from 'valibot';
import { mayDo } from '../../core/access/may-do.ts';
import type { Alarm } from '../../core/alarm/alarm.ts';
import type { Act, ActFault } from '../../core/monitor/act.ts';
import type { Watch } from '../../core/monitor/watch.ts';
import { stripOf } from '../../core/view/strip-of.ts';
import type { RunPaths } from '../../core/view/run-view.ts';
import { runPathsOf } from '../../core/view/run-view-of.ts';
import { togetherOf, type Together } from '../../core/view/together.ts';
import type { Tail } from '../../core/units.ts';
import { viewOf } from '../../core/view/view-of.ts';
import { cardOf } from '../../core/view/card-of.ts';
import type { History, Picture, Strip } from '../../core/view/history.ts';
import type { Monitor } from '../../core/monitor/monitor.ts';
import { seesLine, type Caller } from '../access/caller.ts';
import type { HappeningFound, Page, Store } from '../store/store.ts';
import { actingName } from './acting-name.ts';
import { guaranteesAnswer, historyAnswer, pictureAnswer, runPathsAnswer, stripAnswer, togetherAnswer } from './answers/guarantee-answers.ts';
import { alarmsAnswer, eventsAnswer } from './answers/happening-answers.ts';
import { Conflict, NotFound } from './refusals.ts';
import { acknowledgeRequest, alarmParams, alarmsQuery, eventsQuery, guaranteeParams, historyQuery, restartRequest, togetherQuery } from './request-schemas.ts';
import { route, type AnyRoute } from './route.ts';

/** What the requests of people and programs are answered from. */
export interface ApiHost {
  readonly store: Store;
  readonly monitor: () => Monitor;
  /** Takes effect, is durable, then answers. */
  readonly act: (act: Act) => Promise<ActFault | undefined>;
}

/** Events drawn on one history chart at most. */
const mostEvents = 2_000;

/** Guarantees, alarms and events: what boards and pages ask. */
export function plantRoutes(host: ApiHost): readonly AnyRoute[] {
  const watchOf = ({ id }: { readonly id: string }): Watch => {
    const watch = host.monitor().watches.find(({ guarantee }) => guarantee.id === id);
    if (!watch) throw new NotFound(`there is no guarantee "${id}"`);
    return watch;
  };
  const lineOf = (params: { readonly id: string }): string => watchOf(params).guarantee.line;
  const lineOfGuarantee = (id: string): string | undefined => host.monitor().watches.find(({ guarantee }) => guarantee.id === id)?.guarantee.line;

  return [
    route({
      method: 'GET', path: '/api/guarantees', summary: 'Every guarantee as it stands now', needs: { action: 'see', at: 'somewhere' }, answer: guaranteesAnswer,
      handle: ({ caller }) =>
        host.monitor().watches
          .filter(({ guarantee }) => seesLine(caller, guarantee.line))
          .map((watch) => ({ card: cardOf(watch.guarantee, host.monitor().plant), view: viewOf(watch) })),
    }),
    route({
      method: 'GET', path: '/api/guarantees/together', summary: 'Which guarantees are demonstrated, said of all together', needs: { action: 'see', at: 'somewhere' }, query: togetherQuery, answer: togetherAnswer,
      handle: ({ query: { tail }, caller }): Together => togetherOf(host.monitor().watches.filter(({ guarantee }) => seesLine(caller, guarantee.line)), tail as Tail),
    }),
    route({
      method: 'GET', path: '/api/guarantees/:id/history', summary: 'Bound, estimate and events of a guarantee over a time', needs: { action: 'see', at: lineOf },
      params: guaranteeParams, query: historyQuery, answer: historyAnswer,
      handle: async ({ params, query: { from, to, points } }): Promise<History> => {
        const { guarantee } = watchOf(params);
        const [steps, found] = await Promise.all([
          host.store.history({ guarantee: guarantee.id, from, to, points }),
          host.store.happenings({ from, to, limit: 10_000 }),
        ]);
        const mine = found.map(({ happening }) => happening).filter((one) => concerns(one, guarantee.id, guarantee.line));
        return { ...steps, events: mine.slice(0, mostEvents).reverse() };
      },
    }),
    route({
      method: 'GET', path: '/api/guarantees/:id/strip', summary: "The window's units with its nonconforming ones", needs: { action: 'see', at: lineOf }, params: guaranteeParams, answer: stripAnswer,
      handle: ({ params }): Strip => stripOf(watchOf(params)),
    }),
    route({
      method: 'GET', path: '/api/guarantees/:id/picture', summary: "The picture that suits the guarantee's quantity", needs: { action: 'see', at: lineOf }, params: guaranteeParams, answer: pictureAnswer,
      handle: ({ params }): Picture => watchOf(params).evidence.picture?.() ?? { kind: 'none' },
    }),
    route({
      method: 'GET', path: '/api/guarantees/:id/run', summary: "Where the run's evidence and the change detector's gauge stood", needs: { action: 'see', at: lineOf }, params: guaranteeParams, answer: runPathsAnswer,
      handle: ({ params }): RunPaths => runPathsOf(watchOf(params)),
    }),
    route({
      method: 'POST', path: '/api/guarantees/:id/restart', summary: "Begins a guarantee's evidence anew", needs: { action: 'restart-evidence', at: lineOf },
      params: guaranteeParams, body: restartRequest, answer: v.strictObject({ restarted: v.string() }),
      handle: async ({ params, body: { by, reason }, caller }) => {
        const { guarantee } = watchOf(params);
        await host.act({ kind: 'restart', guarantee: guarantee.id, by: actingName(caller, by), reason });
        return { restarted: guarantee.id };
      },
    }),
    route({
      method: 'GET', path: '/api/alarms', summary: 'Ended alarms, newest first', needs: { action: 'see', at: 'somewhere' }, query: alarmsQuery, answer: alarmsAnswer,
      handle: async ({ query, caller }): Promise<readonly Alarm[]> => (await host.store.endedAlarms(pageOf(query))).filter((alarm) => seesAlarm(caller, alarm, lineOfGuarantee)),
    }),
    route({
      method: 'GET', path: '/api/alarms/standing', summary: 'Alarms that have not ended', needs: { action: 'see', at: 'somewhere' }, answer: alarmsAnswer,
      handle: ({ caller }) => host.monitor().desk.standing().filter((alarm) => seesAlarm(caller, alarm, lineOfGuarantee)),
    }),
    route({
      method: 'POST', path: '/api/alarms/:id/acknowledge', summary: 'Acknowledges a standing alarm',
      needs: { action: 'acknowledge', at: ({ id }: { readonly id: number }) => lineOfGuarantee(standing(host, id).guarantee) }, params: alarmParams, body: acknowledgeRequest, answer: v.strictObject({ acknowledged: v.number() }),
      handle: async ({ params: { id }, body: { by, note }, caller }) => {
        const fault = await host.act({ kind: 'acknowledge', alarm: id, by: actingName(caller, by), note });
        if (fault === 'no-such-alarm') throw new NotFound(`there is no standing alarm ${id}`);
        if (fault !== undefined) throw new Conflict(`alarm ${id} is acknowledged already`);
        return { acknowledged: id };
      },
    }),
    route({
      method: 'GET', path: '/api/events', summary: 'What was decided, newest first', needs: { action: 'see', at: 'somewhere' }, query: eventsQuery, answer: eventsAnswer,
      handle: async ({ query: { guarantee, kind, before, ...rest }, caller }): Promise<readonly HappeningFound[]> => {
        const found = await host.store.happenings({ ...rest, ...(guarantee === undefined ? {} : { guarantee }), ...(kind === undefined ? {} : { kind }), ...(before === undefined ? {} : { before }) });
        return found.filter(({ happening }) => seesHappening(caller, happening, lineOfGuarantee));
      },
    }),
  ];
}

/** @throws NotFound */
function standing(host: ApiHost, id: number): Alarm {
  const found = host.monitor().desk.standing().find((alarm) => alarm.id === id);
  if (!found) throw new NotFound(`there is no standing alarm ${id}`);
  return found;
}

const pageOf = ({ before, limit }: { readonly before?: number | undefined; readonly limit: number }): Page => (before === undefined ? { limit } : { before, limit });

/** What cannot be put on a line is for those who see the whole plant. */
const seesPlace = (caller: Caller, line: string | undefined): boolean => mayDo(caller, 'see', line);

const seesAlarm = (caller: Caller, { guarantee }: Alarm, lineOfGuarantee: (id: string) => string | undefined): boolean => seesPlace(caller, lineOfGuarantee(guarantee));

function seesHappening(caller: Caller, one: HappeningFound['happening'], lineOfGuarantee: (id: string) => string | undefined): boolean {
  return seesPlace(caller, lineOfHappening(one, lineOfGuarantee));
}

function lineOfHappening(one: HappeningFound['happening'], lineOfGuarantee: (id: string) => string | undefined): string | undefined {
  switch (one.kind) {
    case 'alarm':
      return lineOfGuarantee(one.alarm.guarantee);
    case 'restart':
    case 'run':
    case 'evidence':
      return lineOfGuarantee(one.guarantee);
    case 'line':
      return one.line;
    case 'set-aside':
      return undefined;
  }
}

/** Events on a guarantee's time axis: its alarms, its restarts, and what its line said of itself. */
function concerns(one: HappeningFound['happening'], guarantee: string, line: string): boolean {
  switch (one.kind) {
    case 'alarm':
      return one.alarm.guarantee === guarantee;
    case 'restart':
    case 'run':
    case 'evidence':
      return one.guarantee === guarantee;
    case 'line':
      return one.line === line;
    case 'set-aside':
      return false;
  }
}
