import { readFile } from 'node:fs/promises';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { extname, join } from 'node:path';
import { WebSocketServer, type WebSocket } from 'ws';
import type { Alarm } from '../../core/alarm/alarm.ts';
import { liveProtocol, type LiveChange, type LiveMessage, type LiveWatch } from '../../core/live/message.ts';
import type { GuaranteeView } from '../../core/view/guarantee-view.ts';
import { FakeAccess, FakeRefusal, type FakeAccessOptions, type FakeAnswer } from './fake-access.ts';
import { answerOfAccess } from './fake-access-routes.ts';
import { historyOf, pictureOf, runPathsOf, stripOf } from './fake-answers.ts';
import { withHostileText } from './hostile-text.ts';
import { guaranteesOf, plantStart, snapshotOf, type FakeGuarantee } from './fake-plant.ts';

export interface FakeOptions {
  readonly guarantees?: number;
  readonly clockRate?: number;
  /** No source has sent anything yet. */
  readonly noRecords?: boolean;
  /** Who may come; open to everybody where absent. */
  readonly access?: FakeAccessOptions;
  /** Every text that somebody wrote ends in markup that would run if it were taken for such. */
  readonly hostile?: boolean;
}

export interface FakeServer {
  readonly url: string;
  readonly access: FakeAccess;
  /** First messages of the dashboards that came, in order. */
  readonly watches: LiveWatch[];
  readonly posts: { readonly path: string; readonly body: Readonly<Record<string, unknown>> }[];
  readonly tell: (views: readonly GuaranteeView[], alarms?: readonly Alarm[]) => void;
  readonly view: (id: string) => GuaranteeView;
  /** Says nothing any more, the sockets stay open. */
  readonly fallSilent: () => void;
  /** Cuts every live socket and refuses new ones until `returnLive`. */
  readonly cutLive: () => void;
  readonly returnLive: () => void;
  /** Cuts every live socket; who comes back is let in as they may. */
  readonly endSockets: () => void;
  /** Answers the next posts with this refusal. */
  readonly refusePosts: (message: string | undefined) => void;
  readonly stop: () => Promise<void>;
}

const root = new URL('../../.build/client/', import.meta.url).pathname;
const types: Readonly<Record<string, string>> = { '.html': 'text/html; charset=utf-8', '.js': 'text/javascript', '.css': 'text/css', '.svg': 'image/svg+xml', '.woff2': 'font/woff2' };
const policy = "default-src 'self'; connect-src 'self' ws:; style-src 'self'; script-src 'self'; img-src 'self'; font-src 'self'; object-src 'none'; base-uri 'none'";

/** A built file, or the one page for every address of its own. */
async function sendFile(path: string, response: ServerResponse): Promise<void> {
  const name = extname(path) === '' ? 'index.html' : path;
  try {
    const bytes = await readFile(join(root, name));
    response.writeHead(200, { 'content-type': types[extname(name)] ?? 'application/octet-stream', 'content-security-policy': policy }).end(bytes);
  } catch (cause) {
    response.writeHead(404, { 'content-type': 'text/plain' }).end(`not built: ${String(cause)}`);
  }
}

async function bodyOf(request: IncomingMessage): Promise<Record<string, unknown>> {
  let text = '';
  for await (const chunk of request) text += String(chunk);
  return text === '' ? {} : JSON.parse(text) as Record<string, unknown>;
}

/** The client's other side for tests and pictures: the built files, a scripted plant, the live socket. */
export async function startFake(options: FakeOptions = {}): Promise<FakeServer> {
  const texts = <T>(value: T): T => (options.hostile === true ? withHostileText(value) : value);
  const bare = (of: FakeGuarantee): FakeGuarantee =>
    options.noRecords !== true ? of : { card: of.card, view: { ...of.view, state: 'gathering', newest: undefined, estimate: undefined, bound: undefined, oppositeBound: undefined, drift: undefined, figures: { inspected: 0, filled: 0 }, margin: { unitsToGather: 14_978 }, alarmIds: [], warnings: [], lot: undefined, allowance: { estimate: undefined, bound: undefined, opposite: undefined, trail: [] } } };
  const guarantees = guaranteesOf(options.guarantees ?? 8).map(bare);
  const first = snapshotOf(guarantees, options.clockRate ?? 1);
  const views = new Map(first.views.map((view) => [view.id, view]));
  const alarms = new Map((options.noRecords === true ? [] : first.alarms).map((alarm) => [alarm.id, alarm]));
  const watches: LiveWatch[] = [];
  const posts: { path: string; body: Record<string, unknown> }[] = [];
  const access = new FakeAccess(options.access);
  const startedAt = performance.now();
  const plantNow = (): number => Math.round(plantStart + (performance.now() - startedAt) * (options.clockRate ?? 1));
  let revision = 1;
  let refused: string | undefined;
  let silent = false;
  let cut = false;

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const url = new URL(request.url ?? '/', 'http://fake');
    const json = (value: unknown, status = 200): void => {
      response.writeHead(status, { 'content-type': 'application/json' }).end(JSON.stringify(texts(value)));
    };
    const answered = ({ status, body, headers }: FakeAnswer): void => {
      response.writeHead(status, { 'content-type': 'application/json', ...headers }).end(typeof body === 'string' ? body : body === undefined ? undefined : JSON.stringify(texts(body)));
    };
    if (!url.pathname.startsWith('/api/')) { await sendFile(url.pathname, response); return; }
    const [, , kind, id = '', what] = url.pathname.split('/');
    const body = request.method === 'GET' ? {} : await bodyOf(request);
    if (request.method !== 'GET' && refused !== undefined) { json({ message: refused }, 409); return; }
    const ofAccess = answerOfAccess(access, request, url, body);
    if (ofAccess !== undefined) { answered(ofAccess); return; }
    if (access.callerOf(request) === undefined) { json({ message: 'Sign in first, or send a token that holds.' }, 401); return; }
    if (request.method === 'POST') {
      posts.push({ path: url.pathname, body });
      try {
        if (what === 'acknowledge') acknowledge(Number(id), body, request);
        response.writeHead(204).end();
      } catch (cause) {
        if (!(cause instanceof FakeRefusal)) throw cause;
        answered(cause.answer);
      }
      return;
    }
    if (kind === 'alarms') { json([]); return; }
    const of = guarantees.find(({ card }) => card.id === decodeURIComponent(id));
    if (of === undefined) { json({ message: 'no such guarantee' }, 404); return; }
    const ask = (name: string): number => Number(url.searchParams.get(name));
    json(what === 'history' ? historyOf(of, ask('from'), ask('to'), ask('points')) : what === 'strip' ? stripOf(of) : what === 'run' ? runPathsOf(of) : pictureOf(of));
  }

  function acknowledge(id: number, body: Readonly<Record<string, unknown>>, request: IncomingMessage): void {
    const alarm = alarms.get(id);
    if (alarm === undefined) return;
    const said = (name: string): string => (typeof body[name] === 'string' ? body[name] : '');
    const by = access.acknowledges(request, guarantees.find(({ card }) => card.id === alarm.guarantee)?.card.line, said('by'));
    tell([], [{ ...alarm, state: { kind: 'acknowledged', acknowledgement: { by, at: plantNow() as never, note: said('note') } } }]);
  }

  const http = createServer((request, response) => { void answer(request, response); });
  const live = new WebSocketServer({ noServer: true, handleProtocols: (asked) => (asked.has(liveProtocol) ? liveProtocol : false) });
  const send = (socket: WebSocket, message: LiveMessage): void => { if (!silent) socket.send(JSON.stringify(texts(message))); };
  http.on('upgrade', (request, socket, head) => {
    if (cut || request.url !== '/live' || access.callerOf(request) === undefined) { socket.destroy(); return; }
    live.handleUpgrade(request, socket, head, (dashboard) => {
      dashboard.once('message', (data) => {
        watches.push(JSON.parse((data as Buffer).toString('utf8')) as LiveWatch);
        send(dashboard, { ...first, revision, at: plantNow(), views: [...views.values()], alarms: [...alarms.values()] });
      });
    });
  });

  function tell(changed: readonly GuaranteeView[], changedAlarms: readonly Alarm[] = []): void {
    revision += 1;
    for (const view of changed) views.set(view.id, view);
    for (const alarm of changedAlarms) alarms.set(alarm.id, alarm);
    const change: LiveChange = { type: 'change', revision, at: plantNow(), views: changed, alarms: changedAlarms };
    for (const dashboard of live.clients) send(dashboard, change);
  }

  const beat = setInterval(() => {
    for (const dashboard of live.clients) send(dashboard, { type: 'beat', revision, at: plantNow() });
  }, 1000);
  await new Promise<void>((resolve) => { http.listen(0, '127.0.0.1', resolve); });

  return {
    url: `http://127.0.0.1:${(http.address() as AddressInfo).port}`,
    watches, posts, tell, access,
    view: (id) => views.get(id)!,
    fallSilent: () => { silent = true; },
    cutLive: () => { cut = true; for (const dashboard of live.clients) dashboard.terminate(); },
    endSockets: () => { for (const dashboard of live.clients) dashboard.terminate(); },
    returnLive: () => { cut = false; silent = false; },
    refusePosts: (message) => { refused = message; },
    stop: async () => {
      clearInterval(beat);
      for (const dashboard of live.clients) dashboard.terminate();
      http.closeAllConnections();
      await new Promise((resolve) => { http.close(resolve); });
    },
  };
}
