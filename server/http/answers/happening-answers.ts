import * as v from 'valibot';
import type { Alarm } from '../../../core/alarm/alarm.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import type { HappeningFound } from '../../store/store.ts';
import { figures, moment, text, whole } from './answer-parts.ts';
import type { Sent } from './sent.ts';

export const evidenceState = v.picklist(['gathering', 'demonstrated', 'undecided', 'violated', 'unknown']);

const acknowledgement = v.strictObject({ by: text, at: moment, note: text });
const alarmState = v.variant('kind', [
  v.strictObject({ kind: v.literal('raised') }),
  v.strictObject({ kind: v.literal('acknowledged'), acknowledgement }),
  v.strictObject({ kind: v.literal('returned'), returnedAt: moment }),
  v.strictObject({ kind: v.literal('ended'), returnedAt: moment, acknowledgement }),
]);
const grounds = v.pipe(
  v.strictObject({
    source: v.optional(text),
    sequence: v.optional(whole),
    plantVersion: text,
    method: text,
    methodVersion: whole,
    lookRule: v.picklist(['one look', 'all looks', 'no bound']),
    figures,
    records: v.array(v.strictObject({ source: text, first: whole, last: whole })),
    sentence: text,
  }),
  v.description('What was known when it was raised: enough to compute it again from the stored records.'),
);

export const alarmAnswer: v.GenericSchema<Sent<Alarm>> = v.strictObject({
  id: whole,
  guarantee: text,
  rule: v.picklist(['crossing', 'violation', 'deterioration', 'silence', 'bad-data']),
  priority: v.picklist(['high', 'medium', 'low']),
  safetyRelevant: v.boolean(),
  raisedAt: moment,
  times: v.pipe(whole, v.description('How often its condition came back while it was not ended, 1 at first.')),
  state: alarmState,
  response: text,
  grounds,
});
export const alarmsAnswer = v.array(alarmAnswer);

export const happeningAnswer: v.GenericSchema<Sent<Happening>> = v.variant('kind', [
  v.strictObject({ kind: v.literal('evidence'), at: moment, guarantee: text, from: evidenceState, to: evidenceState, source: v.optional(text), sequence: v.optional(whole), figures }),
  v.strictObject({ kind: v.literal('alarm'), at: moment, change: v.picklist(['raised', 'again', 'acknowledged', 'returned', 'ended']), alarm: alarmAnswer }),
  v.strictObject({ kind: v.literal('restart'), at: moment, guarantee: text, by: text, reason: text, run: whole }),
  v.strictObject({ kind: v.literal('run'), at: moment, guarantee: text, run: whole, cause: v.picklist(['lot', 'changeover']), detail: text }),
  v.strictObject({ kind: v.literal('line'), at: moment, line: text, mark: v.picklist(['changeover', 'lot-start', 'lot-end', 'line-stopped', 'line-running']), detail: text }),
  v.strictObject({ kind: v.literal('set-aside'), at: moment, source: text, sequence: whole, records: whole, reason: text }),
]);
const happeningFound: v.GenericSchema<Sent<HappeningFound>> = v.strictObject({ id: whole, journalId: whole, happening: happeningAnswer });
export const eventsAnswer = v.array(happeningFound);
