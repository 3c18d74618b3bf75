import type { Alarm } from '../core/alarm/alarm.ts';
import type { RunPaths } from '../core/view/run-view.ts';
import type { History, Picture, Strip } from '../core/view/history.ts';
import type { Ask } from './ask.ts';

/** What a page may ask the server or have it do. Every failure is an error whose message a person can read. */
export interface Desk {
  readonly history: (guarantee: string, from: number, to: number, points: number) => Promise<History>;
  readonly strip: (guarantee: string) => Promise<Strip>;
  readonly picture: (guarantee: string) => Promise<Picture>;
  readonly run: (guarantee: string) => Promise<RunPaths>;
  readonly endedAlarms: (before: number | undefined, limit: number) => Promise<readonly Alarm[]>;
  /** `by`: the name the person saw; the server refuses when the act would go on record under another. */
  readonly acknowledge: (alarm: number, by: string, note: string) => Promise<void>;
  readonly restart: (guarantee: string, by: string, reason: string) => Promise<void>;
}

const ofGuarantee = (id: string): string => `/api/guarantees/${encodeURIComponent(id)}`;

/** The desk of the server this page came from. */
export const serverDesk = (ask: Ask): Desk => ({
  history: (id, from, to, points) => ask('GET', `${ofGuarantee(id)}/history?from=${Math.round(from)}&to=${Math.round(to)}&points=${points}`),
  strip: (id) => ask('GET', `${ofGuarantee(id)}/strip`),
  picture: (id) => ask('GET', `${ofGuarantee(id)}/picture`),
  run: (id) => ask('GET', `${ofGuarantee(id)}/run`),
  endedAlarms: (before, limit) => ask('GET', `/api/alarms?${before === undefined ? '' : `before=${before}&`}limit=${limit}`),
  acknowledge: (id, by, note) => ask('POST', `/api/alarms/${id}/acknowledge`, { by, note }),
  restart: (id, by, reason) => ask('POST', `${ofGuarantee(id)}/restart`, { by, reason }),
});
