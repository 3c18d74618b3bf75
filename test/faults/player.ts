import type { Alarm } from '../../core/alarm/alarm.ts';
import type { Frame } from '../../core/record/part.ts';
import type { Chance } from '../../server/demo/chance.ts';
import type { Talk } from '../server/serving.ts';
import type { ServerMessage } from '../../core/protocol/source-messages.ts';
import { connectedSource, getJson, heard, postJson } from './harness.ts';
import { bytesOf, endOf, joined, type Step } from './stream.ts';

/** Frames in flight at most: far below what a server grants, and enough that several share a commit. */
const most = 5;

/** Told at the moments at which a test may pull the plug. */
export type Moment = 'sent' | 'acknowledged' | 'asked';

export interface Playing {
  readonly tokens: ReadonlyMap<string, string>;
  readonly steps: readonly Step[];
  readonly chance: Chance;
  readonly onMoment: (moment: Moment) => void;
}

/** What servers have answered so far: it outlives them. */
export class Score {
  /** Step to be played next. */
  step = 0;
  /** Whether the step was begun with a server that is gone. */
  again = false;
  /** By source: everything below is acknowledged. */
  readonly acknowledged = new Map<string, number>();
  /** Alarm that each acknowledge step was about. */
  readonly alarms = new Map<string, number>();
  /** Welcomes that named more than was acknowledged: a kill between being durable and being answered. */
  durableUnanswered = 0;
}

/** Plays the steps that are left; throws ConnectionEnded or a fetch's TypeError when the server goes. */
export async function play(address: string, playing: Playing, score: Score): Promise<void> {
  while (score.step < playing.steps.length) {
    const step = playing.steps[score.step] as Step;
    if (step.kind === 'frames') await playFrames(address, step, playing, score);
    else await playAct(address, step, playing, score);
    score.step += 1;
    score.again = false;
  }
}

async function playFrames(address: string, step: Extract<Step, { kind: 'frames' }>, playing: Playing, score: Score): Promise<void> {
  const { source } = step;
  const { talk, next } = await connectedSource(address, playing.tokens.get(source) ?? '');
  const before = score.acknowledged.get(source) ?? 1;
  if (next < before) throw new Error(`acknowledged up to ${before}, but the server goes on from ${next}: records of ${source} are lost`);
  if (score.again && next > before) score.durableUnanswered += 1;
  try {
    if (step.late) await sendLate(talk, step.frames[0] as Frame, playing);
    else await sendOn(talk, next, step, playing, score);
  } finally {
    talk.socket.terminate();
  }
}

/** A late fill spends no new sequence: only its own answer says that it is durable. */
async function sendLate(talk: Talk<ServerMessage>, frame: Frame, { onMoment }: Playing): Promise<void> {
  talk.send(bytesOf(frame));
  onMoment('sent');
  const answer = await heard(talk);
  if (answer.type !== 'ack') throw new Error(`a late fill was answered with ${JSON.stringify(answer)}`);
  onMoment('acknowledged');
}

/** Sends from the server's next sequence on, now and then a frame twice, and the first one with the one before it. */
async function sendOn(talk: Talk<ServerMessage>, next: number, { source, frames }: Extract<Step, { kind: 'frames' }>, playing: Playing, score: Score): Promise<void> {
  const { chance, onMoment } = playing;
  const end = endOf(frames.at(-1) as Frame);
  let at = frames.findIndex(({ first }) => first === next);
  if (at < 0 && next !== end) throw new Error(`the server goes on from ${next}: no frame begins there`);
  let acknowledged = next;
  score.acknowledged.set(source, next);
  if (at > 0 && chance.below(2) === 0) talk.send(bytesOf(joined(frames[at - 1] as Frame, frames[at++] as Frame)));
  while (acknowledged < end) {
    while (at < frames.length && frames.findIndex((one) => endOf(one) > acknowledged) + most > at) {
      const frame = frames[at++] as Frame;
      talk.send(bytesOf(frame));
      if (chance.below(9) === 0) talk.send(bytesOf(frame));
      onMoment('sent');
    }
    const answer = await heard(talk);
    if (answer.type !== 'ack') throw new Error(`a good frame was answered with ${JSON.stringify(answer)}`);
    acknowledged = Math.max(acknowledged, answer.next);
    score.acknowledged.set(source, acknowledged);
    onMoment('acknowledged');
  }
}

async function playAct(address: string, step: Exclude<Step, { kind: 'frames' }>, playing: Playing, score: Score): Promise<void> {
  if (step.kind === 'acknowledge') return acknowledgeOldest(address, step.note, playing, score);
  const { guarantee, reason } = step;
  if (score.again && (await alreadyRestarted(address, guarantee, reason))) return;
  const asked = postJson(`${address}/api/guarantees/${guarantee}/restart`, { by: 'Mette', reason });
  playing.onMoment('asked');
  const answer = await asked;
  if (!answer.ok) throw new Error(`restart of ${guarantee}: ${answer.status}`);
  playing.onMoment('acknowledged');
}

async function acknowledgeOldest(address: string, note: string, playing: Playing, score: Score): Promise<void> {
  const standing = await getJson<readonly Alarm[]>(`${address}/api/alarms/standing`);
  const waiting = standing.find(({ state }) => state.kind === 'raised' || state.kind === 'returned');
  const alarm = score.alarms.get(note) ?? waiting?.id;
  if (alarm === undefined) throw new Error(`${note}: no alarm waits for being acknowledged`);
  score.alarms.set(note, alarm);
  const asked = postJson(`${address}/api/alarms/${alarm}/acknowledge`, { by: 'Mette', note });
  playing.onMoment('asked');
  const answer = await asked;
  // Asked again: the first time may have taken effect without being answered.
  if (!answer.ok && !(score.again && [404, 409].includes(answer.status))) throw new Error(`${note}, alarm ${alarm}: ${answer.status}`);
  playing.onMoment('acknowledged');
}

async function alreadyRestarted(address: string, guarantee: string, reason: string): Promise<boolean> {
  const events = await getJson<readonly { readonly happening: { readonly kind: string; readonly reason?: string } }[]>(`${address}/api/events?guarantee=${guarantee}&limit=10000`);
  return events.some(({ happening }) => happening.kind === 'restart' && happening.reason === reason);
}
