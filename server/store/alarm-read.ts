import type Database from 'better-sqlite3';
import type { Alarm } from '../../core/alarm/alarm.ts';
import { checkPage } from './query-check.ts';
import type { Page } from './store.ts';

/** All that are not ended, oldest first. */
export function readOpenAlarms(database: Database.Database): Alarm[] {
  return alarmsOf(database.prepare('SELECT body FROM alarms WHERE ended = 0 ORDER BY id').pluck().all());
}

/** Newest first. */
export function readEndedAlarms(database: Database.Database, page: Page): Alarm[] {
  checkPage(page);
  const ended = database.prepare('SELECT body FROM alarms WHERE ended = 1 AND id < ? ORDER BY id DESC LIMIT ?').pluck();
  return alarmsOf(ended.all(page.before ?? Number.MAX_SAFE_INTEGER, page.limit));
}

const alarmsOf = (bodies: readonly unknown[]): Alarm[] => bodies.map((body) => JSON.parse(body as string) as Alarm);
