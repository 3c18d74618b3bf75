import { StoreError } from './store-error.ts';
import type { HappeningQuery, HistoryQuery, KeptRange, Page } from './store.ts';

const most = 10_000;

/** @throws StoreError 'bad-request' */
export function checkHistoryQuery(query: HistoryQuery): void {
  checkRange(query);
  checkWhole('points', query.points, most);
}

/** @throws StoreError 'bad-request' */
export function checkHappeningQuery(query: HappeningQuery): void {
  checkRange(query);
  checkPage(query);
}

/** @throws StoreError 'bad-request' */
export function checkPage(page: Page): void {
  checkWhole('limit', page.limit, most);
  if (page.before !== undefined) checkWhole('before', page.before, Number.MAX_SAFE_INTEGER);
}

function checkRange({ from, to }: KeptRange): void {
  if (!(Number.isSafeInteger(from) && Number.isSafeInteger(to) && from >= 0 && from < to)) {
    throw new StoreError('bad-request', `from ${from}, to ${to}: expected whole milliseconds, 0 or more, from before to.`);
  }
}

function checkWhole(field: string, value: number, upTo: number): void {
  if (!(Number.isSafeInteger(value) && value >= 1 && value <= upTo)) {
    throw new StoreError('bad-request', `${field}: ${value}, expected a whole number from 1 to ${upTo}.`);
  }
}
