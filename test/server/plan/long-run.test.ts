import { describe, expect, it } from 'vitest';
import { Cancelled, runLong } from '../../../server/plan/long-run.ts';

/** Ten steps, each of which the clock of the test takes for `stepMs`. */
function stepping(stepMs: number): { steps: Generator<{ done: number }, { done: number }, undefined>; now: () => number; ended: () => boolean } {
  let [ms, ended] = [0, false];
  function* steps(): Generator<{ done: number }, { done: number }, undefined> {
    for (let step = 1; step < 10; step++) {
      ms += stepMs;
      yield { done: step / 10 };
    }
    ended = true;
    return { done: 1 };
  }
  return { steps: steps(), now: () => ms, ended: () => ended };
}

const never = (): boolean => false;

describe('a long run', () => {
  it('says nothing where it takes less than 300 ms', async () => {
    const { steps, now, ended } = stepping(30);
    const told: number[] = [];
    expect(await runLong(steps, { stop: new AbortController().signal, now, progress: (done) => told.push(done) }, never)).toEqual({ done: 1 });
    expect(told).toEqual([]);
    expect(ended()).toBe(true);
  });

  it('reports how far it is from 300 ms on, each 250 ms', async () => {
    const { steps, now } = stepping(100);
    const told: number[] = [];
    await runLong(steps, { stop: new AbortController().signal, now, progress: (done) => told.push(done) }, never);
    expect(told).toEqual([0.3, 0.6, 0.9]);
  });

  it('ends where the figure is good enough', async () => {
    const { steps, now, ended } = stepping(1);
    expect(await runLong(steps, { stop: new AbortController().signal, now, progress: () => undefined }, ({ done }) => done >= 0.5)).toEqual({ done: 0.5 });
    expect(ended()).toBe(false);
  });

  it('is cancelled between two steps', async () => {
    const { steps, now, ended } = stepping(400);
    const stop = new AbortController();
    await expect(runLong(steps, { stop: stop.signal, now, progress: () => stop.abort() }, never)).rejects.toThrow(Cancelled);
    expect(ended()).toBe(false);
  });
});
