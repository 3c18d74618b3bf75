import { NEVER, Observable, concat, of, throwError, type Subscriber } from 'rxjs';
import { TestScheduler } from 'rxjs/testing';
import { describe, expect, it } from 'vitest';
import { backoffMs } from '../../client/feed/backoff.ts';
import { freshnessOf, silentAfterMs } from '../../client/feed/link.ts';
import { nextPicture } from '../../client/feed/live-picture.ts';
import { liveStateOf, type LiveState } from '../../client/feed/live-state.ts';
import { plantTime } from '../../client/feed/plant-clock.ts';
import { recordAgeOf } from '../../client/feed/record-age.ts';
import { readMessage } from '../../client/feed/read-message.ts';
import type { LiveMessage, LiveWatch } from '../../core/live/message.ts';
import { alarm, snapshot, view } from './made-up.ts';

describe('picture of the plant', () => {
  const first = nextPicture(undefined, snapshot(), 0);

  it('a change replaces the views and alarms it names and keeps the others', () => {
    const next = nextPicture(first, { type: 'change', revision: 8, at: 1_002_000, views: [view({ state: 'undecided' })], alarms: [alarm()] }, 33);
    expect(next?.views.get('leak-a')?.state).toBe('undecided');
    expect([...(next?.alarms.keys() ?? [])]).toEqual([1]);
    expect(next?.revision).toBe(8);
    expect(next?.cards).toBe(first?.cards);
  });

  it('a beat moves the clock and nothing else; views stay the same object', () => {
    const next = nextPicture(first, { type: 'beat', revision: 7, at: 1_060_000 }, 1000);
    expect(next?.views).toBe(first?.views);
    expect(next?.clock).toEqual({ at: 1_060_000, heardAt: 1000, rate: 60 });
  });

  it('a change before any snapshot draws nothing', () => {
    expect(nextPicture(undefined, { type: 'change', revision: 1, at: 1, views: [view()], alarms: [] }, 0)).toBeUndefined();
  });

  it('a change can say that no shift is on; one that is silent about it keeps it', () => {
    const shift = { name: 'early', since: 1, until: 2 };
    const on = nextPicture(first, { type: 'change', revision: 8, at: 1, views: [], alarms: [], shift }, 0);
    expect(on?.plant.shift).toEqual(shift);
    expect(nextPicture(on, { type: 'change', revision: 9, at: 1, views: [], alarms: [] }, 0)?.plant.shift).toEqual(shift);
  });

  it('the plant clock ticks at its own rate between messages', () => {
    expect(plantTime({ at: 1_000_000, heardAt: 500, rate: 60 }, 1500)).toBe(1_060_000);
  });
});

describe('freshness', () => {
  it('is live for three seconds after the last word and not a moment longer', () => {
    expect(freshnessOf({ kind: 'open', heardAt: 100 }, 100 + silentAfterMs).kind).toBe('live');
    expect(freshnessOf({ kind: 'open', heardAt: 100 }, 101 + silentAfterMs).kind).toBe('silent');
    expect(freshnessOf({ kind: 'lost', since: 0, retryAt: 0 }, 5).kind).toBe('lost');
    expect(freshnessOf({ kind: 'connecting' }, 5).kind).toBe('connecting');
  });
});

describe('age of the newest record', () => {
  const picture = (newest: number | undefined) => nextPicture(undefined, snapshot({ views: [view({ newest: 5 }), view({ id: 'b', newest })].slice(newest === undefined ? 1 : 0) }), 0)!;

  it('is old after a minute of the wall clock, however fast the plant’s runs', () => {
    expect(recordAgeOf(picture(1000), 1000 + 3_600_000)).toEqual({ kind: 'fresh', ageMs: 3_600_000 });
    expect(recordAgeOf(picture(1000), 1001 + 3_600_000).kind).toBe('old');
    expect(recordAgeOf(picture(undefined), 9e9)).toEqual({ kind: 'none yet' });
  });
});

describe('messages', () => {
  it('what cannot be read is a fault that says why', () => {
    expect(readMessage('{')).toMatchObject({ ok: false });
    expect(readMessage('{"type":"news"}')).toEqual({ ok: false, fault: 'live message of type "news"; expected snapshot, change, beat or stopping' });
    expect(readMessage('null')).toMatchObject({ ok: false });
    expect(readMessage('')).toMatchObject({ ok: false });
    expect(readMessage('{"type":"beat","revision":1,"at":2}').ok).toBe(true);
  });
});

describe('null on the wire', () => {
  const told = (text: string): LiveMessage => {
    const read = readMessage(text);
    if (!read.ok) throw new Error(read.fault);
    return read.value;
  };

  it('is absence: a bound that is no number is not drawn at zero', () => {
    const next = nextPicture(nextPicture(undefined, snapshot(), 0), told(JSON.stringify({ type: 'change', revision: 8, at: 1, alarms: [], views: [view({ bound: Number.NaN, allowance: { estimate: Number.NaN, bound: Number.NaN, opposite: undefined, trail: [] } })] })), 0);
    expect(next?.views.get('leak-a')?.allowance.bound).toBeUndefined();
    expect(next?.views.get('leak-a')?.bound).toBeUndefined();
  });

  it('says that a shift is over', () => {
    const on = nextPicture(undefined, told(JSON.stringify(snapshot({ plant: { ...snapshot().plant, shift: { name: 'early', since: 1, until: 2 } } }))), 0);
    expect(on?.plant.shift?.name).toBe('early');
    expect(nextPicture(on, told('{"type":"change","revision":8,"at":1,"views":[],"alarms":[],"shift":null}'), 0)?.plant.shift).toBeUndefined();
  });
});

describe('waiting before the next try', () => {
  it('doubles up to fifteen seconds, spread by half', () => {
    expect([1, 2, 3, 6, 60].map((failures) => backoffMs(failures, 0))).toEqual([250, 500, 1000, 7500, 7500]);
    expect(backoffMs(6, 0.9999)).toBeCloseTo(15_000, -1);
  });
});

describe('feed', () => {
  /** Runs a feed in virtual time; each connection is what `connect` answers. */
  function runFeed(connect: (tries: number) => Observable<LiveMessage>, forMs: number): { states: LiveState[]; watches: LiveWatch[]; triedAt: number[] } {
    const states: LiveState[] = [];
    const watches: LiveWatch[] = [];
    const triedAt: number[] = [];
    const scheduler = new TestScheduler(() => undefined);
    scheduler.maxFrames = forMs;
    scheduler.run(({ flush }) => {
      const subscription = liveStateOf({
        messages: (watch) => { watches.push(watch()); triedAt.push(scheduler.now()); return connect(watches.length); },
        now: () => scheduler.now(), chance: () => 0, scheduler,
      }).subscribe((state) => { states.push(state); });
      scheduler.maxFrames = forMs;
      scheduler.schedule(() => { subscription.unsubscribe(); }, forMs);
      flush();
    });
    return { states, watches, triedAt };
  }
  const broken = (...messages: LiveMessage[]): Observable<LiveMessage> => concat(of(...messages), throwError(() => new Error('cut')));

  it('waits longer after each failure and not at all longer after a success', () => {
    const { triedAt } = runFeed((tries) => (tries === 4 ? broken(snapshot()) : broken()), 4000);
    expect(triedAt.slice(0, 6)).toEqual([0, 250, 750, 1750, 2000, 2500]);
  });

  it('resumes from the boot and revision it knows', () => {
    const { watches } = runFeed((tries) => (tries === 1 ? broken(snapshot(), { type: 'beat', revision: 9, at: 2 }) : NEVER), 5000);
    expect(watches).toEqual([{ type: 'watch' }, { type: 'watch', boot: 'b1', revision: 9 }]);
  });

  it('keeps the last picture when the connection is lost and says that it is lost', () => {
    const { states } = runFeed((tries) => (tries === 1 ? broken(snapshot()) : NEVER), 2000);
    expect(states.at(-1)?.link).toMatchObject({ kind: 'lost', retryAt: 250 });
    expect(states.at(-1)?.picture?.revision).toBe(7);
  });

  it('gives up a socket that has been silent for ten seconds', () => {
    const { triedAt } = runFeed(() => new Observable((subscriber: Subscriber<LiveMessage>) => { subscriber.next(snapshot()); }), 12_000);
    expect(triedAt).toEqual([0, 10_250]);
  });
});
