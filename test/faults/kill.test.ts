import Database from 'better-sqlite3';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Chance } from '../../server/demo/chance.ts';
import { dataDirectory, tokenFor } from '../server/serving.ts';
import { endAll, ServerProcess } from './harness.ts';
import { faultPlant } from './plant.ts';
import { play, Score, type Playing } from './player.ts';
import { Course, type Step } from './stream.ts';
import { wholeState, type WholeState } from './whole-state.ts';

const kills = 54;
const seed = 20_260_601;

/** Good and bad times on two lines, about ten frames for each kill. */
function courseOf(seed: number): readonly Step[] {
  const course = new Course(seed);
  for (let round = 1; round <= 6; round += 1) {
    course.change();
    course.hoses(30, 0);
    course.bottles(8, 0);
    course.hoses(20, 0.4 + 0.1 * round);
    course.lossAndLateFill(40 + round);
    course.bottles(6, 0.9);
    course.acknowledge(`seen, round ${round}`);
    course.hoses(6, 0.2);
    course.restart(round % 2 === 0 ? 'chain' : 'leak', `dies changed, round ${round}`);
    course.hoses(20, 0);
    if (round === 3) course.silence(20 * 60_000);
    course.bottles(6, 0);
    course.acknowledge(`seen too, round ${round}`);
  }
  return course.steps;
}

interface Site {
  readonly data: ReturnType<typeof dataDirectory>;
  readonly tokens: ReadonlyMap<string, string>;
}

async function siteOf(): Promise<Site> {
  const data = dataDirectory(faultPlant);
  const tokens = new Map<string, string>();
  for (const [source, stations] of [['gateway-a', ['A.cutting', 'A.crimping', 'A.leak-test', 'A.final', 'A.paint']], ['gateway-k', ['K.filling']]] as const) {
    tokens.set(source, await tokenFor(data.path, source, stations));
  }
  return { data, tokens };
}

/** What the disk says after a kill. */
function onDisk(path: string): { readonly entry: number; readonly snapshot: number } {
  const database = new Database(join(path, 'vouchline.db'), { readonly: true });
  try {
    const one = (sql: string): number => database.prepare(sql).pluck().get() as number;
    return { entry: one('SELECT coalesce(max(id), 0) FROM journal'), snapshot: one('SELECT coalesce(max(journal_id), 0) FROM snapshots') };
  } finally {
    database.close();
  }
}

const course = courseOf(seed);
let calm: Site;
let stormy: Site;
let expected: WholeState;
const score = new Score();

beforeAll(async () => {
  [calm, stormy] = await Promise.all([siteOf(), siteOf()]);
});
afterAll(() => {
  endAll();
  calm.data.remove();
  stormy.data.remove();
});

describe('a server that is killed again and again', () => {
  it('first plays the whole course to one that is left in peace', async () => {
    const server = ServerProcess.start(calm.data.path);
    const address = await server.address;
    const playing: Playing = { tokens: calm.tokens, steps: course, chance: new Chance('calm', seed), onMoment: () => undefined };
    const peaceful = new Score();
    await play(address, playing, peaceful);
    expected = await wholeState(address);
    for (const [note, alarm] of peaceful.alarms) score.alarms.set(note, alarm);
    await server.kill();
    // The course is worth the trouble: alarms of several rules come, go and are acknowledged.
    const rules = new Set([...expected.ended, ...expected.standing].map(({ rule }) => rule));
    expect(rules.size).toBeGreaterThanOrEqual(3);
    expect(expected.ended.length).toBeGreaterThanOrEqual(3);
    expect(expected.standing.length).toBeGreaterThanOrEqual(1);
    expect(expected.happenings.length).toBeGreaterThan(60);
  });

  it('[D1][D2] loses nothing acknowledged, counts nothing twice, and comes to the same state', async () => {
    const chance = new Chance('storm', seed);
    const met = { startUp: 0, midSnapshot: 0, afterSnapshot: 0, acknowledged: 0, inFlight: 0 };
    for (let kill = 0; kill < kills; kill += 1) await life(chance, met);
    const last = ServerProcess.start(stormy.data.path);
    const address = await last.address;
    await play(address, { tokens: stormy.tokens, steps: course, chance, onMoment: () => undefined }, score);
    const state = await wholeState(address);
    await last.kill();
    expect(state).toEqual(expected);
    expect(score.step).toBe(course.length);
    // Every moment that matters was met; how often the two that fall between disk and answer are hit is the machine's doing.
    for (const times of [met.startUp, met.acknowledged, met.inFlight, met.midSnapshot + met.afterSnapshot]) expect(times).toBeGreaterThanOrEqual(3);
    expect(score.durableUnanswered).toBeGreaterThanOrEqual(1);
  }, 180_000);
});

/** One life of the server: it ends by a kill while it starts, right at an acknowledgement, or a few milliseconds after a frame or an act. */
async function life(chance: Chance, met: { startUp: number; midSnapshot: number; afterSnapshot: number; acknowledged: number; inFlight: number }): Promise<void> {
  const entriesASnapshot = chance.oneOf([1, 2, 5, 40, 100_000]);
  const server = ServerProcess.start(stormy.data.path, ['--snapshot-entries', String(entriesASnapshot)]);
  if (chance.below(8) === 0) {
    met.startUp += 1;
    await new Promise((resolve) => setTimeout(resolve, chance.below(500)));
    return server.kill();
  }
  let left = 1 + chance.below(4);
  const atAcknowledgement = chance.below(2) === 0;
  const delayMs = chance.below(7);
  let pulled = false;
  const playing: Playing = {
    tokens: stormy.tokens,
    steps: course,
    chance,
    onMoment(moment) {
      if (moment === 'acknowledged') left -= 1;
      if (pulled || left > 0 || (moment === 'acknowledged') !== atAcknowledgement) return;
      pulled = true;
      met[atAcknowledgement ? 'acknowledged' : 'inFlight'] += 1;
      if (atAcknowledgement) server.signal('SIGKILL');
      else setTimeout(() => server.signal('SIGKILL'), delayMs);
    },
  };
  score.again = true;
  const cause: unknown = await play(await server.address, playing, score).then(
    () => new Error('the course ended before the kills did'),
    (error: unknown) => error,
  );
  // Anything but the connection's end is a finding; so is a server that ended by itself.
  if (!pulled) throw cause;
  expect(await server.ended).toEqual({ code: null, signal: 'SIGKILL' });
  if (cause instanceof Error && !/closed with|fetch failed|terminated/.test(cause.message)) throw cause;
  const { entry, snapshot } = onDisk(stormy.data.path);
  if (entriesASnapshot < 40) met[entry - snapshot >= entriesASnapshot ? 'midSnapshot' : 'afterSnapshot'] += 1;
}
