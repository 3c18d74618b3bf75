import { readPlant } from '../../../core/plant/read-plant.ts';
import type { Plant } from '../../../core/plant/plant.ts';
import type { Frame, Origin, Part } from '../../../core/record/part.ts';
import { frameOf } from '../../../core/record/frame-of.ts';

/** A small plant on one hose line; `guarantee` is the text of the guarantee's fields, indented by four. */
export function plantWith(guarantee: string, more = ''): Plant {
  const text = `vouchline: 1
plant: { name: Hose works, time-zone: Europe/Copenhagen }
shifts:
  - { name: Early, days: Mon-Sun, from: "06:00", to: "14:00" }
  - { name: Late, days: Mon-Sun, from: "14:00", to: "22:00" }
lines:
  - { id: A, name: Hose line A, stations: [{ id: A.crimping, name: Crimping }, { id: A.leak-test, name: Leak test }] }
products:
  - { id: BH-4, name: Brake hose 4 mm, characteristics: [{ id: tightness, name: Tightness }, { id: crimp, name: Crimp }] }
  - { id: BH-5, name: Brake hose 5 mm, characteristics: [{ id: tightness, name: Tightness }, { id: crimp, name: Crimp }] }
guarantees:
  - id: leak-A
    station: A.leak-test
    characteristic: tightness
    quantity: nonconforming-fraction
${guarantee}
${more}`;
  const reading = readPlant(text, 'v');
  if (!reading.ok) throw new Error(reading.fault.map(({ sentence }) => sentence).join('\n'));
  return reading.value.plant;
}

export const leakTest: Origin = { station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', lot: undefined };

/** Verdicts one second apart from `start` on; `nonconforming` lists places. */
export function verdicts(records: number, nonconforming: readonly number[], start: number, origin = leakTest, step = 1_000): Part {
  return { kind: 'verdicts', origin, records, time: { kind: 'steady', start, step }, nonconforming: Uint32Array.from(nonconforming) };
}

export function frame(first: number, ...parts: Part[]): Frame {
  return frameOf(first, parts);
}

/** A Monday morning, 08:00 in the plant's zone. */
export const monday = Date.UTC(2026, 5, 1, 6, 0, 0);
