import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { whoDesk } from '../../client/access/who-desk.ts';
import type { Who } from '../../client/access/who.ts';
import { Refusal, type Ask } from '../../client/ask.ts';

const account = { kind: 'account', name: 'Ines', account: 'ines', grants: [], until: undefined, may: {}, pin: undefined as unknown, terminal: true };
const meOf = (caller: unknown): object => ({ access: 'accounts', firstAccount: false, passkeys: false, caller });

beforeEach(() => { vi.useFakeTimers({ now: 1_000_000 }); });
afterEach(() => { vi.useRealTimers(); });

function deskWith(answers: (() => unknown)[]): { readonly desk: ReturnType<typeof whoDesk>; readonly seen: Who[]; readonly asked: string[]; readonly kept: boolean[] } {
  const asked: string[] = [];
  const kept: boolean[] = [];
  const ask: Ask = <T>(method: string, path: string): Promise<T> => {
    asked.push(`${method} ${path}`);
    const answer = answers.shift();
    return new Promise((resolve) => { resolve((answer === undefined ? meOf(undefined) : answer()) as T); });
  };
  const desk = whoDesk({ ask, wall: () => Date.now(), chance: () => 0, display: { is: () => false, keep: (is) => kept.push(is) } });
  const seen: Who[] = [];
  desk.who$.subscribe((who) => seen.push(who));
  return { desk, seen, asked, kept };
}

const refuse = (status: number) => (): never => { throw new Refusal(status, 'no'); };

describe('asking who sits here', () => {
  it('goes on until the server answers', async () => {
    const { desk, seen, asked } = deskWith([refuse(503), refuse(503), () => meOf(account)]);
    await desk.refresh();
    expect(seen.at(-1)).toMatchObject({ kind: 'asking', unanswered: true });
    await vi.advanceTimersByTimeAsync(250);
    await vi.advanceTimersByTimeAsync(500);
    expect(seen.at(-1)?.kind).toBe('known');
    await vi.advanceTimersByTimeAsync(60_000);
    expect(asked).toHaveLength(3);
  });

  it('asks again when acting by PIN or the session runs out', async () => {
    const { desk, seen, asked } = deskWith([() => meOf({ ...account, until: 1_000_000 + 3_600_000, pin: { name: 'Tom', until: 1_000_000 + 120_000 } }), () => meOf(account)]);
    await desk.refresh();
    await vi.advanceTimersByTimeAsync(119_000);
    expect(asked).toHaveLength(1);
    await vi.advanceTimersByTimeAsync(2_000);
    expect(asked).toHaveLength(2);
    expect(seen.at(-1)).toMatchObject({ kind: 'known', caller: { pin: undefined } });
  });

  it('asks once where several want to know at once', async () => {
    const { desk, asked } = deskWith([() => meOf(account)]);
    await Promise.all([desk.refresh(), desk.refresh()]);
    expect(asked).toEqual(['GET /api/me']);
  });

  it('signing out is done also where the session had ended already, and fails where nothing answers', async () => {
    const { desk, seen } = deskWith([() => meOf(account), refuse(401), () => meOf(undefined)]);
    await desk.refresh();
    await desk.signOut();
    expect(seen.at(-1)).toMatchObject({ kind: 'nobody', why: 'left' });
    const other = deskWith([() => meOf(account), refuse(503)]);
    await other.desk.refresh();
    await expect(other.desk.signOut()).rejects.toThrow('no');
    expect(other.seen.at(-1)?.kind).toBe('known');
  });

  it('a session that ends while somebody leaves was left, not ended', async () => {
    const { desk, seen } = deskWith([() => meOf(account), () => meOf(undefined), () => meOf(undefined)]);
    await desk.refresh();
    await desk.signOut(async () => { await desk.refresh(); }); // the connection ends before the answer is here
    expect(seen.flatMap((who) => (who.kind === 'nobody' ? [who.why] : []))).toEqual(['left', 'left', 'left', 'left']);
  });

  it('keeps whether this browser is a display, until somebody signs out', async () => {
    const { desk, kept } = deskWith([() => meOf({ ...account, kind: 'display' }), () => meOf(undefined), () => undefined]);
    await desk.refresh();
    await desk.refresh();
    expect(kept).toEqual([true]);
    await desk.signOut();
    expect(kept.at(-1)).toBe(false);
  });
});
