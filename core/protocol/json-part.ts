import {
  checkedCorrection, checkedExposures, checkedFinding, checkedMeasurements, checkedTallies, checkedTime, checkedVerdicts,
} from '../record/checked-part.ts';
import { checkedId, checkedMoment, checkedReason, checkedSequence, checkedWhole } from '../record/checked-words.ts';
import type { Finding, LineMark, Lost, Origin, Part } from '../record/part.ts';
import { refuse } from '../record/refusal.ts';
import type { TimeColumn } from '../record/time-column.ts';
import { numberAt, numberColumn, timeColumn, wholeColumn } from './json-column.ts';
import { expectFields, objectAt, type JsonObject } from './json-object.ts';
import { partFields } from './json-fields.ts';
import type { OriginMemo } from './origin-memo.ts';

/**
 * One part of a JSON frame, checked. Refuses with fields named within the part.
 *
 * @param sequence of the part's first record
 * @param most records with content the frame may still hold
 */
export function partOfJson(json: JsonObject, origins: OriginMemo, sequence: number, most: number): Part {
  switch (json.kind) {
    case 'verdicts':
    case 'tallies':
    case 'exposures':
    case 'measurements':
      return inspectionPart(json, json.kind, origins, most);
    case 'correction':
      return correction(json, origins, sequence);
    case 'changeover':
    case 'lot-start':
    case 'lot-end':
    case 'line-stopped':
    case 'line-running':
      return lineMark(json, json.kind);
    case 'lost':
      return lost(json);
    default:
      return refuse(typeof json.kind === 'string' ? 'unknown-kind' : 'wrong-type', 'kind', json.kind, `one of ${Object.keys(partFields).join(', ')}`);
  }
}

type InspectionKind = 'verdicts' | 'tallies' | 'exposures' | 'measurements';

function inspectionPart(json: JsonObject, kind: InspectionKind, origins: OriginMemo, most: number): Part {
  const { fields, least } = partFields[kind];
  expectFields(json, json.lot === undefined ? least : least + 1, fields);
  const origin = origins.of(json.station, json.product, json.characteristic, json.lot);
  const time = timeColumn(json.time, most);
  const part = contentOf(json, kind, origin, time, most);
  if (part.records === 0) refuse('empty-frame', '', part.kind, 'at least one record in each part');
  checkedTime(time, part.records);
  return part;
}

function contentOf(json: JsonObject, kind: InspectionKind, origin: Origin, time: TimeColumn, most: number): Part {
  switch (kind) {
    case 'verdicts': {
      const units = checkedWhole(json.units, 'units', 1);
      if (units > most) refuse('too-many-records', 'units', units, `at most ${most} records more in this frame`);
      return checkedVerdicts(origin, units, time, wholeColumn(json.nonconforming, 'nonconforming', units));
    }
    case 'tallies':
      return checkedTallies(origin, time, wholeColumn(json.inspected, 'inspected', most), wholeColumn(json.nonconforming, 'nonconforming', most));
    case 'exposures':
      return checkedExposures(origin, time, wholeColumn(json.count, 'count', most), numberColumn(json.exposure, 'exposure', most));
    case 'measurements':
      return checkedMeasurements(origin, time, numberColumn(json.value, 'value', most));
  }
}

function correction(json: JsonObject, origins: OriginMemo, sequence: number): Part {
  const { fields, least } = partFields.correction;
  expectFields(json, json.lot === undefined ? least : least + 1, fields);
  return checkedCorrection({
    kind: 'correction',
    records: 1,
    origin: origins.of(json.station, json.product, json.characteristic, json.lot),
    at: checkedMoment(json.time),
    corrects: checkedSequence(json.corrects, 'corrects'),
    finding: findingOf(objectAt(json.finding, 'finding', 'what the re-inspection found, an object')),
    reason: checkedReason(json.reason),
  }, sequence);
}

function findingOf(json: JsonObject): Finding {
  switch (json.kind) {
    case 'verdict':
      expectFields(json, 2, ['kind', 'nonconforming'], 'finding.');
      return typeof json.nonconforming === 'boolean'
        ? { kind: 'verdict', nonconforming: json.nonconforming }
        : refuse('wrong-type', 'finding.nonconforming', json.nonconforming, 'true or false');
    case 'tally':
      expectFields(json, 3, ['kind', 'inspected', 'nonconforming'], 'finding.');
      return checkedFinding({
        kind: 'tally',
        inspected: checkedWhole(json.inspected, 'finding.inspected', 1),
        nonconforming: checkedWhole(json.nonconforming, 'finding.nonconforming', 0),
      }, 'finding.');
    case 'exposure':
      expectFields(json, 3, ['kind', 'count', 'exposure'], 'finding.');
      return checkedFinding({
        kind: 'exposure',
        count: checkedWhole(json.count, 'finding.count', 0),
        exposure: numberAt(json.exposure, 'finding.exposure'),
      }, 'finding.');
    case 'measurement':
      expectFields(json, 2, ['kind', 'value'], 'finding.');
      return checkedFinding({ kind: 'measurement', value: numberAt(json.value, 'finding.value') }, 'finding.');
    default:
      return refuse('unknown-kind', 'finding.kind', json.kind, 'one of verdict, tally, exposure, measurement');
  }
}

function lineMark(json: JsonObject, kind: LineMark['kind']): LineMark {
  const { fields, least } = partFields[kind];
  expectFields(json, json.size === undefined ? least : least + 1, fields);
  const at = checkedMoment(json.time);
  const line = checkedId(json.line, 'line');
  switch (kind) {
    case 'changeover':
      return { kind, records: 1, at, line, product: checkedId(json.product, 'product') };
    case 'lot-start':
      return {
        kind, records: 1, at, line,
        product: checkedId(json.product, 'product'),
        lot: checkedId(json.lot, 'lot'),
        size: json.size === undefined ? undefined : checkedWhole(json.size, 'size', 1),
      };
    case 'lot-end':
      return { kind, records: 1, at, line, lot: checkedId(json.lot, 'lot') };
    case 'line-stopped':
      return { kind, records: 1, at, line, reason: checkedReason(json.reason) };
    case 'line-running':
      return { kind, records: 1, at, line };
  }
}

function lost(json: JsonObject): Lost {
  expectFields(json, partFields.lost.least, partFields.lost.fields);
  return {
    kind: 'lost',
    records: checkedWhole(json.records, 'records', 1),
    at: checkedMoment(json.time),
    station: checkedId(json.station, 'station'),
    reason: checkedReason(json.reason),
  };
}
