import type { Alarm } from '../core/alarm/alarm.ts';
import type { RunPaths } from '../core/view/run-view.ts';
import type { History, Picture, Strip } from '../core/view/history.ts';

/** What a page may ask the server or have it do. Every failure is an error whose message a person can read. */
export interface Desk {
  readonly history: (guarantee: string, from: number, to: number, points: number) => Promise<History>;
  readonly strip: (guarantee: string) => Promise<Strip>;
  readonly picture: (guarantee: string) => Promise<Picture>;
  readonly run: (guarantee: string) => Promise<RunPaths>;
  readonly endedAlarms: (before: number | undefined, limit: number) => Promise<readonly Alarm[]>;
  readonly acknowledge: (alarm: number, by: string, note: string) => Promise<void>;
  readonly restart: (guarantee: string, by: string, reason: string) => Promise<void>;
}

async function answerOf(path: string, init?: RequestInit): Promise<unknown> {
  const response = await fetch(path, { ...init, headers: { accept: 'application/json', ...init?.headers } });
  if (response.ok) return response.status === 204 ? undefined : response.json();
  const text = (await response.text()).slice(0, 300);
  throw new Error(sentenceIn(text) ?? `the server answered ${response.status}`);
}

/** The server's own sentence, where its refusal carries one. */
function sentenceIn(text: string): string | undefined {
  try {
    const value: unknown = JSON.parse(text);
    return typeof value === 'object' && value !== null && 'message' in value && typeof value.message === 'string'
      ? value.message
      : undefined;
  } catch {
    return undefined;
  }
}

const post = async (path: string, body: Readonly<Record<string, string>>): Promise<void> => {
  await answerOf(path, { method: 'POST', body: JSON.stringify(body), headers: { 'content-type': 'application/json' } });
};

const ofGuarantee = (id: string): string => `/api/guarantees/${encodeURIComponent(id)}`;

/** The desk of the server this page came from. */
export const serverDesk: Desk = {
  history: (id, from, to, points) =>
    answerOf(`${ofGuarantee(id)}/history?from=${Math.round(from)}&to=${Math.round(to)}&points=${points}`) as Promise<History>,
  strip: (id) => answerOf(`${ofGuarantee(id)}/strip`) as Promise<Strip>,
  picture: (id) => answerOf(`${ofGuarantee(id)}/picture`) as Promise<Picture>,
  run: (id) => answerOf(`${ofGuarantee(id)}/run`) as Promise<RunPaths>,
  endedAlarms: (before, limit) =>
    answerOf(`/api/alarms?${before === undefined ? '' : `before=${before}&`}limit=${limit}`) as Promise<readonly Alarm[]>,
  acknowledge: (id, by, note) => post(`/api/alarms/${id}/acknowledge`, { by, note }),
  restart: (id, by, reason) => post(`${ofGuarantee(id)}/restart`, { by, reason }),
};
