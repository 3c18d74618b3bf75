// Frames the load of the benchmarks is made of, from a fixed seed, ready to be numbered and sent.
import { binaryOfFrame } from '../../.build/core/protocol/binary-frame-writer.js';
import { characteristics, leastForce, product, stationOf } from './plant-text.mjs';

/** What a record is like. 'steady': one pace for all records of a frame; 'each': a time of its own for every record. */
export const shapes = {
  'verdicts, steady pace': { kind: 'verdicts', times: 'steady' },
  'verdicts, a time each': { kind: 'verdicts', times: 'each' },
  'measurements, a time each': { kind: 'measurements', times: 'each' },
};

/** Numbers from 0 to 1, the same at every run. */
export function chanceFrom(seed) {
  let state = seed % 2_147_483_647 || 1;
  return () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647;
}

function partOf({ kind, times }, stream, records, chance, at) {
  const origin = { station: stationOf(stream), product, characteristic: characteristics[kind], lot: undefined };
  const time = times === 'steady' || records === 1
    ? { kind: 'steady', start: at, step: records === 1 ? 0 : 10 }
    : { kind: 'each', times: Float64Array.from({ length: records }, (_, place) => at + place * 10 + (place % 7)) };
  const bad = Array.from({ length: records }, () => chance() < 0.0005);
  if (kind === 'verdicts') return { kind, origin, records, time, nonconforming: Uint32Array.from(bad.flatMap((is, place) => (is ? [place] : []))) };
  return { kind, origin, records, time, value: Float64Array.from(bad, (is) => (is ? leastForce - 1 : leastForce + Math.round(chance() * 4_000) / 8)) };
}

function jsonOf({ kind, origin: { station, characteristic }, records, time, nonconforming, value }) {
  const times = time.kind === 'each' ? Array.from(time.times) : records === 1 ? time.start : { start: time.start, step: time.step };
  const content = kind === 'verdicts' ? { units: records, nonconforming: Array.from(nonconforming) } : { value: Array.from(value) };
  return JSON.stringify({ kind, station, product, characteristic, time: times, ...content });
}

/**
 * Frames of one stream that differ in content; `numbered` gives one of them its first sequence.
 *
 * @param form 'binary' or 'json'
 */
export function framesOf({ shape, form, stream, records, variants }) {
  const chance = chanceFrom(7_919 * (stream + 1));
  const at = Date.now() - 60_000;
  const parts = Array.from({ length: variants }, () => partOf(shapes[shape], stream, records, chance, at));
  if (form === 'json') {
    const texts = parts.map((part) => `,"parts":[${jsonOf(part)}]}`);
    return { numbered: (variant, first) => `{"type":"records","first":${first}${texts[variant]}` };
  }
  const made = parts.map((part) => Buffer.from(binaryOfFrame({ first: 1, records, parts: [part] })));
  return {
    numbered(variant, first) {
      const bytes = made[variant];
      bytes.writeUInt32LE(first % 4_294_967_296, 8);
      bytes.writeUInt32LE(Math.floor(first / 4_294_967_296), 12);
      return bytes;
    },
  };
}
