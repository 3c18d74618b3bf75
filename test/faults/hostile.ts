import type { Chance } from '../../server/demo/chance.ts';
import { leakFrame, monday } from './frames.ts';

/** A message that no source in its right mind sends: some are even good frames, out of order. */
export function hostileMessage(chance: Chance): Uint8Array | string {
  return chance.oneOf(kinds)(chance);
}

const part = { kind: 'verdicts', station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', units: 3, nonconforming: [1], time: monday };
const json = (more: object): string => JSON.stringify({ type: 'records', first: 1, parts: [part], ...more });

/** Values that stand where others are expected. */
const odd: readonly [unknown, ...unknown[]] = [null, -1, 1e308, 0.5, 2 ** 53, '', 'x'.repeat(5_000), [], {}, [[]], true, '__proto__', 'constructor', -0, '1e3', [null], { length: 9e9 }];

function randomBytes(chance: Chance, most: number): Uint8Array {
  return Uint8Array.from({ length: chance.below(most) }, () => chance.below(256));
}

/** A good frame with some bits turned over. */
function flipped(chance: Chance): Uint8Array {
  const frame = leakFrame(1, 1 + chance.below(60), [0]);
  for (let i = 0; i <= chance.below(6); i += 1) {
    const at = chance.below(frame.length);
    frame[at] = (frame[at] ?? 0) ^ (1 << chance.below(8));
  }
  return frame;
}

/** A good frame one of whose lengths is huge. */
function huge(chance: Chance): Uint8Array {
  const frame = leakFrame(1, 5, [1]);
  const view = new DataView(frame.buffer);
  const at = chance.oneOf([4, 16, 18, 20, 60, 64, 68]);
  if (chance.below(2) === 0) view.setUint32(Math.min(at, frame.length - 4), 0xffffffff - chance.below(9), true);
  else view.setUint16(Math.min(at, frame.length - 2), 0xffff, true);
  return frame;
}

const deep = (depth: number, open: string, close: string): string => open.repeat(depth) + '0' + close.repeat(depth);

const kinds: readonly [(chance: Chance) => Uint8Array | string, ...((chance: Chance) => Uint8Array | string)[]] = [
  (chance) => randomBytes(chance, 400),
  (chance) => Uint8Array.of(0x56, 0x46, 1, 0, ...randomBytes(chance, 300)),
  (chance) => leakFrame(1, 50, [3, 9]).subarray(0, chance.below(140)),
  flipped,
  huge,
  (chance) => leakFrame(2 + chance.below(1_000_000), 1 + chance.below(100)), // Out of order: a gap.
  (chance) => Buffer.concat([leakFrame(1, 5), randomBytes(chance, 40), Uint8Array.of(7)]),
  (chance) => String.fromCharCode(...randomBytes(chance, 200).filter((byte) => byte < 128)),
  (chance) => json({ parts: [part] }).slice(0, chance.below(180)),
  (chance) => json({ first: chance.oneOf(odd) }),
  (chance) => json({ parts: chance.oneOf(odd) }),
  (chance) => json({ parts: [chance.oneOf(odd)] }),
  (chance) => json({ parts: [{ ...part, [chance.oneOf(Object.keys(part) as [string, ...string[]])]: chance.oneOf(odd) }] }),
  (chance) => json({ parts: [{ ...part, kind: 'correction', corrects: 1, reason: 'x', finding: chance.oneOf(odd) }] }),
  () => '{"type":"records","first":1,"parts":[{"__proto__":{"kind":"verdicts"},"kind":"lost","station":"A.leak-test"}]}',
  () => '{"__proto__":{"polluted":1},"type":"records","first":1,"parts":[]}',
  () => json({ parts: [{ ...part, constructor: { prototype: { polluted: 1 } } }] }),
  (chance) => deep(1 + chance.below(20_000), '[', ']'),
  (chance) => json({}).replace('[1]', deep(1 + chance.below(20_000), '{"a":', '}')),
  () => JSON.stringify({ type: 'records', first: 1, parts: [{ ...part, time: { start: 1e300, step: 1e300 } }] }),
  () => `{"type":"records","first":1,"parts":[${'{"kind":"line-running"},'.repeat(300)}{}]}`,
];
