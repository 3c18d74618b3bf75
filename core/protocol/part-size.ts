import type { Part } from '../record/part.ts';
import type { TimeColumn } from '../record/time-column.ts';
import { bitsForm, padded, partHeadBytes, timeForm } from './binary-layout.ts';

/** How a part is going to be written: its form byte, what it lists, its bytes with padding. */
export interface PartPlan {
  readonly form: number;
  readonly listed: number;
  readonly bytes: number;
}

/** The smallest form of a part. @param reasonBytes UTF-8 bytes of its reason, 0 where it has none */
export function planOf(part: Part, reasonBytes: number): PartPlan {
  switch (part.kind) {
    case 'verdicts': {
      const listed = part.nonconforming.length;
      const asBits = Math.ceil(part.records / 8);
      const inBits = asBits < listed * 4;
      return planned(timeFormOf(part.time) | (inBits ? bitsForm : 0), listed, timeBytes(part.time) + (inBits ? asBits : listed * 4));
    }
    case 'tallies':
    case 'measurements':
      return planned(timeFormOf(part.time), 0, timeBytes(part.time) + part.records * 8);
    case 'exposures':
      return planned(timeFormOf(part.time), 0, timeBytes(part.time) + part.records * 12);
    case 'correction':
      return planned(0, reasonBytes, 32 + reasonBytes);
    default:
      return planned(0, reasonBytes, 16 + reasonBytes);
  }
}

const planned = (form: number, listed: number, body: number): PartPlan => ({ form, listed, bytes: padded(partHeadBytes + body) });

function timeFormOf(time: TimeColumn): number {
  if (time.kind === 'steady') return timeForm.steady;
  return spanOf(time.times) < 4_294_967_296 ? timeForm.offsets : timeForm.each;
}

function timeBytes(time: TimeColumn): number {
  if (time.kind === 'steady') return 16;
  return timeFormOf(time) === timeForm.each ? time.times.length * 8 : padded(8 + time.times.length * 4);
}

function spanOf(times: Float64Array): number {
  let latest = -Infinity;
  for (const time of times) if (time > latest) latest = time;
  return latest - earliest(times);
}

/** Smallest of the times, from which offsets are counted. */
export function earliest(times: Float64Array): number {
  let least = Infinity;
  for (const time of times) if (time < least) least = time;
  return least;
}
