import type { Part } from '../record/part.ts';
import type { TimeColumn } from '../record/time-column.ts';
import { bitsForm, padded, partHeadBytes, timeForm } from './binary-layout.ts';

/** How a part is going to be written: its form byte, what it lists, its bytes with padding. */
export interface PartPlan {
  readonly form: number;
  readonly listed: number;
  readonly bytes: number;
  /** Smallest time, from which offsets are counted; 0 where there are none. */
  readonly base: number;
}

interface TimePlan {
  readonly form: number;
  readonly bytes: number;
  readonly base: number;
}

/** The smallest form of a part. @param reasonBytes UTF-8 bytes of its reason, 0 where it has none */
export function planOf(part: Part, reasonBytes: number): PartPlan {
  switch (part.kind) {
    case 'verdicts': {
      const listed = part.nonconforming.length;
      const asBits = Math.ceil(part.records / 8);
      const inBits = asBits < listed * 4;
      return withTimes(timePlanOf(part.time), inBits ? bitsForm : 0, listed, inBits ? asBits : listed * 4);
    }
    case 'tallies':
    case 'measurements':
      return withTimes(timePlanOf(part.time), 0, 0, part.records * 8);
    case 'exposures':
      return withTimes(timePlanOf(part.time), 0, 0, part.records * 12);
    case 'correction':
      return { form: 0, listed: reasonBytes, bytes: padded(partHeadBytes + 32 + reasonBytes), base: 0 };
    default:
      return { form: 0, listed: reasonBytes, bytes: padded(partHeadBytes + 16 + reasonBytes), base: 0 };
  }
}

const withTimes = (time: TimePlan, form: number, listed: number, columns: number): PartPlan => ({
  form: time.form | form,
  listed,
  bytes: padded(partHeadBytes + time.bytes + columns),
  base: time.base,
});

const steady: TimePlan = { form: timeForm.steady, bytes: 16, base: 0 };

function timePlanOf(time: TimeColumn): TimePlan {
  if (time.kind === 'steady') return steady;
  const { times } = time;
  let [earliest, latest] = [Infinity, -Infinity];
  for (let i = 0; i < times.length; i += 1) {
    const at = times[i] as number;
    if (at < earliest) earliest = at;
    if (at > latest) latest = at;
  }
  return latest - earliest < 4_294_967_296
    ? { form: timeForm.offsets, bytes: padded(8 + times.length * 4), base: earliest }
    : { form: timeForm.each, bytes: times.length * 8, base: 0 };
}
