import { binaryOfFrame } from '../../core/protocol/binary-frame-writer.ts';
import { frameOf } from '../../core/record/frame-of.ts';

export const monday = Date.UTC(2026, 5, 1, 6);

/** Leak-test verdicts of the plant with one leak test, one a second of the sequence, in binary form. */
export function leakFrame(first: number, records: number, nonconforming: readonly number[] = []): Uint8Array {
  const origin = { station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', lot: undefined };
  const time = { kind: 'steady', start: monday + first * 1_000, step: 1_000 } as const;
  return binaryOfFrame(frameOf(first, [{ kind: 'verdicts', origin, records, time, nonconforming: Uint32Array.from(nonconforming) }]));
}

/** As many leak-test verdicts as a frame may hold, their times uneven: about 260 kB. */
export function unevenFrame(): Uint8Array {
  const origin = { station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', lot: undefined };
  const times = Float64Array.from({ length: 65_536 }, (_, i) => monday + i * 10 + (i % 3));
  return binaryOfFrame(frameOf(1, [{ kind: 'verdicts', origin, records: 65_536, time: { kind: 'each', times }, nonconforming: new Uint32Array(0) }]));
}

/** The same frame with another first sequence, which stands at byte 8; below 2^32. */
export function beginningAt(frame: Uint8Array, first: number): Uint8Array {
  const copy = frame.slice();
  new DataView(copy.buffer).setUint32(8, first, true);
  return copy;
}
