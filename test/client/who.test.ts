import { BehaviorSubject, of, Subject, type Observable } from 'rxjs';
import { describe, expect, it } from 'vitest';
import { actions } from '../../core/access/action.ts';
import { actorOf } from '../../client/access/actor.ts';
import { mayDo, mayDoSomewhere, type Caller, type Me } from '../../client/access/me.ts';
import { keepReturn, takeReturn } from '../../client/access/return-path.ts';
import { grantsInWords, roleMissing } from '../../client/access/role-words.ts';
import { nextWho, type Who } from '../../client/access/who.ts';
import { liveOfCaller } from '../../client/feed/live-of-caller.ts';
import { startState, type LiveState } from '../../client/feed/live-state.ts';

const onA = { plant: false, lines: ['a'] } as const;
const caller = (part: Partial<Caller> = {}): Caller => ({ kind: 'account', name: 'Ines Maurer', account: 'ines', grants: [], until: undefined, may: { see: onA, acknowledge: onA }, pin: undefined, terminal: true, hasPassword: true, ...part });
const me = (of?: Caller): Me => ({ access: 'accounts', firstAccount: false, passkeys: false, directory: undefined, caller: of });
const asking: Who = { kind: 'asking', unanswered: false, display: false };
const known = (of: Caller = caller()): Who => nextWho(asking, { kind: 'told', me: me(of) });

describe('who sits here', () => {
  it('is nobody for a reason', () => {
    const told = { kind: 'told', me: me() } as const;
    expect(nextWho(asking, told)).toMatchObject({ kind: 'nobody', why: 'not yet' });
    expect(nextWho(known(), told)).toMatchObject({ kind: 'nobody', why: 'ended' });
    expect(nextWho(known(caller({ kind: 'display' })), told)).toMatchObject({ kind: 'nobody', why: 'withdrawn' });
    expect(nextWho({ ...asking, display: true }, told)).toMatchObject({ kind: 'nobody', why: 'withdrawn' });
    const left = nextWho(known(), { kind: 'left' });
    expect(left).toMatchObject({ kind: 'nobody', why: 'left', me: { caller: undefined } });
    expect(nextWho(left, told)).toMatchObject({ why: 'left' });
  });

  it('is still known while the server does not answer', () => {
    const who = known();
    expect(nextWho(who, { kind: 'unanswered' })).toBe(who);
    expect(nextWho(asking, { kind: 'unanswered' })).toEqual({ ...asking, unanswered: true });
  });

  it('may what the server says, there and nowhere else', () => {
    expect([mayDo(caller(), 'acknowledge', 'a'), mayDo(caller(), 'acknowledge', 'b'), mayDo(caller(), 'acknowledge', undefined)]).toEqual([true, false, false]);
    expect(mayDo(caller({ may: { see: { plant: true, lines: 'all' } } }), 'see', 'whatever')).toBe(true);
    expect([mayDoSomewhere(caller(), 'see'), mayDoSomewhere(caller(), 'load-plant'), mayDoSomewhere(caller({ may: { see: { plant: false, lines: [] } } }), 'see')]).toEqual([true, false, false]);
  });
});

describe('under whose name', () => {
  it('acts go on record: the session’s, the person’s by PIN, or the one that is typed', () => {
    expect(actorOf(known(), 'typed once')).toMatchObject({ named: 'session', name: 'Ines Maurer', ownName: 'Ines Maurer' });
    expect(actorOf(known(caller({ pin: { name: 'Tom Reiter', until: 1 } })), '')).toMatchObject({ named: 'pin', name: 'Tom Reiter', ownName: 'Ines Maurer' });
    expect(actorOf(known(caller({ kind: 'open', name: undefined })), 'Mette')).toMatchObject({ named: 'typed', name: 'Mette' });
    expect(actorOf(known(caller({ kind: 'display', name: 'Bench' })), '')).toMatchObject({ named: 'pin', name: '' });
  });

  it('a display acknowledges only where people may act at it, and nobody may do anything', () => {
    const display = caller({ kind: 'display', may: { see: onA } });
    expect(actorOf(known(display), '').may('acknowledge', 'a')).toBe(true);
    expect(actorOf(known({ ...display, terminal: false }), '').may('acknowledge', 'a')).toBe(false);
    expect(actorOf(known({ ...display, pin: { name: 'Tom', until: 1 }, may: { acknowledge: onA } }), '').may('acknowledge', 'b')).toBe(false);
    for (const action of actions) expect(actorOf(asking, 'Ines').may(action, 'a')).toBe(false);
  });
});

describe('roles in words', () => {
  const lines = [{ id: 'a', name: 'Hose line A' }, { id: 'b', name: 'Hose line B' }];

  it('places with the same roles are told together', () => {
    expect(grantsInWords([{ role: 'engineer', line: undefined }, { role: 'administrator', line: undefined }], lines)).toBe('Engineer and administrator for the whole plant');
    expect(grantsInWords([{ role: 'maintenance', line: 'a' }, { role: 'viewer', line: undefined }, { role: 'maintenance', line: 'b' }], lines)).toBe('Maintenance for Hose line A and Hose line B; viewer for the whole plant');
    expect(grantsInWords([{ role: 'viewer', line: 'gone' }], lines)).toBe('Viewer for gone');
    expect(grantsInWords([], lines)).toBe('No role');
  });

  it('what is missing names the roles that would do', () => {
    expect(roleMissing('Acknowledging', 'acknowledge', 'Hose line A')).toBe('Acknowledging needs the role supervisor, maintenance or engineer for Hose line A.');
    expect(roleMissing('Loading', 'load-plant', 'Hose line A')).toBe('Loading needs the role engineer for the whole plant.');
  });
});

describe('the way back', () => {
  it('leads to a page of this program or to the board, once', () => {
    const kept = new Map<string, string>();
    const storage = { getItem: (key: string) => kept.get(key) ?? null, setItem: (key: string, text: string) => void kept.set(key, text), removeItem: (key: string) => void kept.delete(key) };
    keepReturn(storage, '/guarantees/leak-a');
    expect([takeReturn(storage), takeReturn(storage)]).toEqual(['/guarantees/leak-a', '/']);
    for (const path of ['//elsewhere.example/', '/sign-in', '/join', 'javascript:alert(1)', '/no-such-page']) {
      keepReturn(storage, path);
      expect(takeReturn(storage)).toBe('/');
    }
  });
});

describe('the live state of a caller', () => {
  const collected = (who$: Observable<Who>, live$: () => Observable<LiveState>, onLost = (): void => undefined): { readonly states: LiveState[]; readonly stop: () => void } => {
    const states: LiveState[] = [];
    const subscription = liveOfCaller(who$, live$, onLost).subscribe((state) => states.push(state));
    return { states, stop: () => { subscription.unsubscribe(); } };
  };

  it('is opened for a caller, anew for another, and for nobody holds nothing', () => {
    const who$ = new BehaviorSubject<Who>(asking);
    let opened = 0;
    const open: LiveState = { link: { kind: 'open', heardAt: 1 }, picture: undefined };
    const { states, stop } = collected(who$, () => { opened += 1; return of(open); });
    expect([opened, states.at(-1)]).toEqual([0, startState]);
    who$.next(known());
    who$.next(known(caller({ pin: { name: 'Tom', until: 1 } })));
    expect([opened, states.at(-1)]).toEqual([1, open]);
    who$.next(known(caller({ account: 'tom' })));
    expect(opened).toBe(2);
    who$.next(nextWho(who$.value, { kind: 'left' }));
    expect([opened, states.at(-1)]).toEqual([2, startState]);
    who$.next(known(caller({ may: {} })));
    expect(opened).toBe(2);
    stop();
  });

  it('asks once for each loss whether the session still stands', () => {
    const live$ = new Subject<LiveState>();
    let asked = 0;
    const { stop } = collected(of(known()), () => live$, () => { asked += 1; });
    const lost: LiveState = { link: { kind: 'lost', since: 0, retryAt: 1 }, picture: undefined };
    live$.next(lost);
    live$.next(lost);
    expect(asked).toBe(1);
    live$.next({ link: { kind: 'open', heardAt: 1 }, picture: undefined });
    live$.next({ ...lost, link: { ...lost.link } });
    expect(asked).toBe(2);
    stop();
  });
});
