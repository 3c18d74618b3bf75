import { describe, expect, it } from 'vitest';
import { BinaryFrameReader } from '../../../core/protocol/binary-frame-reader.ts';
import { binaryOfFrame } from '../../../core/protocol/binary-frame-writer.ts';
import { sourceLimits } from '../../../core/protocol/limits.ts';
import type { Correction, Frame } from '../../../core/record/part.ts';
import { timeAt } from '../../../core/record/time-column.ts';
import { demoPlant, momentOf } from '../../../server/demo/demo-plant.ts';
import { StationFeed } from '../../../server/demo/station-feed.ts';
import { inspectionsOf, levelAt } from '../../../server/demo/station-minute.ts';
import { demoStations } from '../../../server/demo/stations.ts';

const plant = demoPlant(1);
const dayAndNight = 1_500;
const stationOf = (id: string) => demoStations.find((station) => station.id === id)!;
const framesOf = (id: string): (Frame | undefined)[] => {
  const feed = new StationFeed(plant, stationOf(id));
  return Array.from({ length: dayAndNight }, (_, minute) => feed.minute(minute));
};
const partsOf = (frames: readonly (Frame | undefined)[]) => frames.flatMap((frame) => frame?.parts ?? []);
const clock = (hours: number, minutes = 0): number => hours * 60 + minutes;

describe('what a station of the demo sends', () => {
  it.each(demoStations.map(({ id }) => id))('is numbered without gap and readable as sent, within the limits: %s', (id) => {
    const reader = new BinaryFrameReader(sourceLimits);
    let next = 1;
    for (const frame of framesOf(id)) {
      if (frame === undefined) continue;
      expect(frame.first).toBe(next);
      next += frame.records;
      const read = reader.read(binaryOfFrame(frame));
      expect(read).toEqual({ ok: true, value: frame });
    }
    expect(next).toBeGreaterThan(dayAndNight / 2);
  });

  it('is inspected in the minute before it is sent, but for what waited in a buffer', () => {
    framesOf('A.leak-test').forEach((frame, minute) => {
      for (const part of frame?.parts ?? []) {
        if (!('time' in part)) continue;
        const from = minute === clock(10, 40) ? clock(10, 15) : minute;
        expect(timeAt(part.time, 0)).toBeGreaterThanOrEqual(momentOf(plant, from));
        expect(timeAt(part.time, part.records - 1)).toBeLessThan(momentOf(plant, minute + 1));
      }
    });
  });

  it('waits in the buffer while the station cannot reach the server, and comes in order afterwards', () => {
    const frames = framesOf('A.leak-test');
    expect(frames.slice(clock(10, 15), clock(10, 40)).every((frame) => frame === undefined)).toBe(true);
    const late = frames[clock(10, 40)]!;
    expect(late.records).toBe(26 * 40);
    expect(late.first).toBe(frames[clock(10, 14)]!.first + 40);
  });

  it('holds no inspections while the line stands', () => {
    const frames = framesOf('A.crimping');
    expect([clock(9), clock(9, 11), clock(9, 30), clock(9, 44)].map((minute) => frames[minute])).toEqual([undefined, undefined, undefined, undefined]);
    expect([clock(8, 59), clock(9, 12), clock(9, 45)].map((minute) => frames[minute]?.records)).toEqual([60, 60, 60]);
  });

  it('holds as many units of a lot as its start has said', () => {
    const parts = partsOf(framesOf('A.cutting'));
    const sizes = parts.flatMap((part) => (part.kind === 'lot-start' ? [[part.lot, part.size] as const] : []));
    expect(sizes.length).toBe(13);
    for (const [lot, size] of sizes.slice(1, -1)) {
      const units = parts.reduce((sum, part) => sum + (part.kind === 'exposures' && part.origin.lot === lot ? part.records : 0), 0);
      expect(units).toBe(size);
    }
  });

  it('corrects rejects that a second look passes, naming a record that was rejected, once', () => {
    const frames = framesOf('B.final-inspection');
    const rejected = new Set<number>();
    const corrections: Correction[] = [];
    for (const frame of frames) {
      let sequence = frame?.first ?? 0;
      for (const part of frame?.parts ?? []) {
        if (part.kind === 'verdicts' && part.origin.characteristic === 'finish') for (const place of part.nonconforming) rejected.add(sequence + place);
        if (part.kind === 'correction') {
          corrections.push(part);
          expect(rejected.delete(part.corrects)).toBe(true);
          expect(part.finding).toEqual({ kind: 'verdict', nonconforming: false });
          expect(part.origin.characteristic).toBe('finish');
        }
        sequence += part.records;
      }
    }
    expect(corrections.length).toBeGreaterThan(20);
    expect(corrections.length).toBeLessThan(rejected.size / 3);
  });

  it('declares what a full buffer has cost', () => {
    const frame = framesOf('K.filling')[clock(13, 10)]!;
    expect(frame.parts).toEqual([{ kind: 'lost', records: 60, at: momentOf(plant, clock(13, 10)), station: 'K.filling', reason: 'The buffer of the station ran over' }]);
  });
});

describe('the level of a stream', () => {
  const stream = { kind: 'verdicts', characteristic: 'crimp', perMinute: 40, level: 0.002 } as const;
  const trouble = { station: 'A.crimping', characteristic: 'crimp', from: 100, until: 200, level: 0.012 };

  it('jumps in a sudden trouble, creeps in a slow one, and is back with the repair', () => {
    const levels = (course: 'sudden' | 'slow') => [99, 100, 150, 199, 200].map((minute) => levelAt(stream, [{ ...trouble, course }], minute));
    expect(levels('sudden')).toEqual([0.002, 0.012, 0.012, 0.012, 0.002]);
    levels('slow').forEach((level, i) => expect(level).toBeCloseTo([0.002, 0.002, 0.007, 0.0119, 0.002][i]!, 12));
  });

  it('is not moved by the trouble of another characteristic', () => {
    expect(levelAt(stream, [{ ...trouble, characteristic: 'tightness', course: 'sudden' }], 150)).toBe(0.002);
  });

  it('is what the units come from', () => {
    const found = (from: number, until: number): number => {
      let nonconforming = 0;
      for (let minute = from; minute < until; minute += 1) for (const part of inspectionsOf(plant, stationOf('A.final-inspection'), minute)) if (part.kind === 'verdicts' && part.origin.characteristic === 'finish') nonconforming += part.nonconforming.length;
      return nonconforming;
    };
    // 22 minutes of 40 hoses at 13 % from 08:38 on: 114 expected, five standard deviations are 50; before, 6 and 12.
    expect(Math.abs(found(clock(8, 38), clock(9)) - 114)).toBeLessThan(50);
    expect(found(clock(8, 16), clock(8, 38))).toBeLessThan(18);
  });
});
