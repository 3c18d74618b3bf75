import { routeOf } from '../route.ts';

const key = 'vouchline-return';

/** Where someone was when they were sent to sign in; kept while the tab is open, also over the way to a directory. */
export function keepReturn(storage: Pick<Storage, 'setItem'>, path: string): void {
  storage.setItem(key, path);
}

/** Takes the kept path; the board where there is none, or none of this program's pages. */
export function takeReturn(storage: Pick<Storage, 'getItem' | 'removeItem'>): string {
  const path = storage.getItem(key) ?? '/';
  storage.removeItem(key);
  const { kind } = routeOf(path);
  return kind === 'nowhere' || kind === 'sign-in' || kind === 'join' || kind === 'display' ? '/' : path;
}
