import { noPlaces } from '../../core/record/no-places.ts';
import type { InspectionPart, LineMark, Origin } from '../../core/record/part.ts';
import type { TimeColumn } from '../../core/record/time-column.ts';
import { Chance } from './chance.ts';
import type { Trouble } from './plant-day.ts';
import { dayStart, type Roster } from './roster.ts';
import { bottlesPerMinute, hosesPerMinute, type DemoStation, type Stream } from './stations.ts';

export const minuteMs = 60_000;

/** The invented plant: when its first day began, ms, and what its chance is seeded with. */
export interface DemoPlant {
  readonly midnight: number;
  readonly seed: number;
  readonly roster: Roster;
}

/** How well a stream is in a minute: at its usual level, or where a trouble has brought it. */
export function levelAt(stream: Stream, troubles: readonly Trouble[], minuteOfDay: number): number {
  const trouble = troubles.find(({ characteristic, from, until }) => characteristic === stream.characteristic && from <= minuteOfDay && minuteOfDay < until);
  if (trouble === undefined) return stream.level;
  const { course, level, from, until } = trouble;
  const gone = course === 'sudden' ? 1 : (minuteOfDay - from) / (until - from);
  return stream.level + (level - stream.level) * gone;
}

/** What a station inspects in a minute, one part a stream; nothing while its line stands. */
export function inspectionsOf({ midnight, seed, roster }: DemoPlant, station: DemoStation, minute: number): InspectionPart[] {
  const { id, line, streams } = station;
  if (roster.stopAt(line, minute) !== undefined) return [];
  const troubles = roster.dayOf(minute).troubles.filter((trouble) => trouble.station === id);
  const minuteOfDay = minute - dayStart(minute);
  const product = roster.productAt(line, minute);
  const lot = roster.lotAt(line, minute);
  return streams.map((stream) => {
    const origin: Origin = { station: id, product, characteristic: stream.characteristic, lot };
    const time: TimeColumn = { kind: 'steady', start: midnight + minute * minuteMs, step: minuteMs / stream.perMinute };
    return partOf(stream, origin, time, levelAt(stream, troubles, minuteOfDay), new Chance(seed, id, stream.characteristic, minute));
  });
}

function partOf(stream: Stream, origin: Origin, time: TimeColumn, level: number, chance: Chance): InspectionPart {
  const records = stream.perMinute;
  switch (stream.kind) {
    case 'verdicts': {
      const places = chance.places(records, level);
      return { kind: 'verdicts', origin, records, time, nonconforming: places.length === 0 ? noPlaces : Uint32Array.from(places) };
    }
    case 'tallies':
      return { kind: 'tallies', origin, records, time, inspected: Uint32Array.of(stream.units), nonconforming: Uint32Array.of(chance.places(stream.units, level).length) };
    case 'exposures': {
      const expected = (level / 100) * stream.metres;
      return { kind: 'exposures', origin, records, time, count: Uint32Array.from({ length: records }, () => chance.poisson(expected)), exposure: new Float64Array(records).fill(stream.metres) };
    }
    case 'measurements':
      return { kind: 'measurements', origin, records, time, value: Float64Array.from({ length: records }, () => read(chance.normal(level, stream.sd), stream.step)) };
  }
}

/** As the device shows it: whole steps, without the trail of binary fractions. */
const read = (value: number, step: number): number => Number((Math.round(value / step) * step).toFixed(3));

/** What a line says of itself at the beginning of a minute. `opening`: nobody has been told anything of it yet. */
export function marksOf({ midnight, roster }: DemoPlant, { line }: DemoStation, minute: number, opening: boolean): LineMark[] {
  const at = midnight + minute * minuteMs;
  const common = { records: 1, at, line } as const;
  const product = roster.productAt(line, minute);
  const lot = roster.lotAt(line, minute);
  const stop = roster.stopAt(line, minute);
  const stood = !opening && roster.stopAt(line, minute - 1) !== undefined;
  const newLot = opening || lot !== roster.lotAt(line, minute - 1);
  const marks: LineMark[] = [];
  if (newLot && !opening) marks.push({ kind: 'lot-end', ...common, lot: roster.lotAt(line, minute - 1) });
  if (stop !== undefined && !stood) marks.push({ kind: 'line-stopped', ...common, reason: stop.reason });
  if (opening || product !== roster.productAt(line, minute - 1)) marks.push({ kind: 'changeover', ...common, product });
  if (newLot) marks.push({ kind: 'lot-start', ...common, product, lot, size: roster.lotRunningMinutes(line, minute) * unitsPerMinute(line) });
  if (stop === undefined && (stood || opening)) marks.push({ kind: 'line-running', ...common });
  return marks;
}

const unitsPerMinute = (line: string): number => (line === 'K' ? bottlesPerMinute : hosesPerMinute);
