import {
  checkedCorrection, checkedExposures, checkedFinding, checkedMeasurements, checkedTallies, checkedTime, checkedVerdicts,
} from '../record/checked-part.ts';
import { checkedMoment, checkedReason, checkedSequence, largestWhole } from '../record/checked-words.ts';
import type { Finding, InspectionPart, LineMark, Lost, Origin, Part } from '../record/part.ts';
import { refuse } from '../record/refusal.ts';
import type { TimeColumn } from '../record/time-column.ts';
import { latestMs } from '../units.ts';
import { bitsForm, findings, kinds, noName, partHeadBytes, timeForm } from './binary-layout.ts';
import { nameAt, type Table } from './binary-table.ts';
import type { ByteCursor } from './byte-cursor.ts';
import { textOfUtf8 } from './utf8.ts';

/** What stands before the body of a part. */
interface PartHead {
  readonly form: number;
  /** Place of the origin, or of the line's or station's name. */
  readonly named: number;
  readonly records: number;
  /** Nonconforming units of verdicts, bytes of the reason of others. */
  readonly listed: number;
}

/**
 * One part of a binary frame, checked; the cursor is left behind it. Refuses with fields named within the part.
 *
 * @param sequence of the part's first record
 * @param most records with content the frame may still hold
 */
export function partOfBytes(cursor: ByteCursor, table: Table, sequence: number, most: number): Part {
  const at = cursor.take(partHeadBytes, '');
  const kind = kinds[cursor.u8(at) - 1] ?? refuse('unknown-kind', 'kind', cursor.u8(at), `1 to ${kinds.length}`);
  const head: PartHead = { form: cursor.u8(at + 1), named: cursor.u16(at + 2), records: cursor.u32(at + 4), listed: cursor.u32(at + 8) };
  if (cursor.u32(at + 12) !== 0) refuse('reserved-not-zero', '', cursor.u32(at + 12), 'zero in bytes 12 to 15');
  if (head.records === 0) refuse('empty-frame', '', kind, 'at least one record in each part');
  if (kind !== 'lost' && head.records > most) refuse('too-many-records', '', head.records, `at most ${most} records more in this frame`);
  const part = contentOf(cursor, table, kind, head, sequence);
  cursor.align('');
  return part;
}

function contentOf(cursor: ByteCursor, table: Table, kind: Part['kind'], head: PartHead, sequence: number): Part {
  switch (kind) {
    case 'verdicts':
    case 'tallies':
    case 'exposures':
    case 'measurements':
      return inspectionPart(cursor, originAt(table, head.named), kind, head);
    case 'correction':
      return correction(cursor, originAt(table, head.named), head, sequence);
    default:
      return eventPart(cursor, table, kind, head);
  }
}

function originAt(table: Table, place: number): Origin {
  return table.origins[place] ?? refuse('unknown-name', 'origin', place, `a place in the list of ${table.origins.length} origins`);
}

function inspectionPart(cursor: ByteCursor, origin: Origin, kind: InspectionPart['kind'], head: PartHead): InspectionPart {
  const { form, records, listed } = head;
  if (form > (kind === 'verdicts' ? 7 : 3)) refuse('reserved-not-zero', 'form', form, 'a form of this layout version');
  if (kind !== 'verdicts' && listed !== 0) refuse('reserved-not-zero', 'listed', listed, 'zero but for verdicts and reasons');
  const time = timeOf(cursor, form & 3, records);
  switch (kind) {
    case 'verdicts':
      return checkedVerdicts(origin, records, time, placesOf(cursor, form, records, listed));
    case 'tallies':
      return checkedTallies(origin, time, cursor.u32Column(records, 'inspected'), cursor.u32Column(records, 'nonconforming'));
    case 'exposures': {
      const exposure = cursor.f64Column(records, 'exposure');
      return checkedExposures(origin, time, cursor.u32Column(records, 'count'), exposure);
    }
    case 'measurements':
      return checkedMeasurements(origin, time, cursor.f64Column(records, 'value'));
  }
}

function timeOf(cursor: ByteCursor, form: number, records: number): TimeColumn {
  switch (form) {
    case timeForm.steady: {
      const at = cursor.take(16, 'time');
      return checkedTime({ kind: 'steady', start: cursor.f64(at), step: cursor.f64(at + 8) }, records);
    }
    case timeForm.each:
      return checkedTime({ kind: 'each', times: cursor.f64Column(records, 'time') }, records);
    case timeForm.offsets:
      return offsetTimes(cursor, records);
    default:
      return refuse('unknown-kind', 'form', form, 'times that are steady, offsets or each');
  }
}

function offsetTimes(cursor: ByteCursor, records: number): TimeColumn {
  const base = checkedMoment(cursor.f64(cursor.take(8, 'time')), 'time[0]');
  const column: TimeColumn = { kind: 'each', times: cursor.offsetColumn(base, records, 'time') };
  cursor.align('time');
  // Whole offsets from a whole base are whole; only near the end of all times can one be too late.
  return base + largestWhole <= latestMs ? column : checkedTime(column, records);
}

function placesOf(cursor: ByteCursor, form: number, records: number, listed: number): Uint32Array {
  if (listed > records) refuse('out-of-range', 'nonconforming', listed, `at most the ${records} units of the part`);
  return form < bitsForm ? cursor.u32Column(listed, 'nonconforming') : placesOfBits(cursor, records, listed);
}

function placesOfBits(cursor: ByteCursor, records: number, listed: number): Uint32Array {
  const size = Math.ceil(records / 8);
  const from = cursor.take(size, 'nonconforming');
  const places = new Uint32Array(listed);
  let found = 0;
  for (let i = 0; i < size; i += 1) {
    for (let bits = cursor.u8(from + i); bits !== 0; bits &= bits - 1) {
      if (found < listed) places[found] = i * 8 + 31 - Math.clz32(bits & -bits);
      found += 1;
    }
  }
  return found === listed ? places : refuse('wrong-length', 'nonconforming', found, `as many bits set as listed: ${listed}`);
}

/** Body: f64 time, u64 corrects, u32 and u32 and f64 of the finding, reason. */
function correction(cursor: ByteCursor, origin: Origin, head: PartHead, sequence: number): Part {
  expectOne(head);
  const at = cursor.take(32, '');
  const finding = findingOf(head.form, cursor.u32(at + 16), cursor.u32(at + 20), cursor.f64(at + 24));
  return checkedCorrection({
    kind: 'correction',
    records: 1,
    origin,
    at: checkedMoment(cursor.f64(at)),
    corrects: checkedSequence(cursor.u64(at + 8), 'corrects'),
    finding: checkedFinding(finding, 'finding.'),
    reason: reasonOf(cursor, head.listed),
  }, sequence);
}

function findingOf(form: number, first: number, second: number, real: number): Finding {
  const kind = findings[form] ?? refuse('unknown-kind', 'finding.kind', form, `0 to ${findings.length - 1}`);
  if ((kind === 'verdict' && first > 1) || (kind !== 'tally' && second !== 0) || (kind !== 'exposure' && kind !== 'measurement' && real !== 0)
    || (kind === 'measurement' && first !== 0)) {
    refuse('reserved-not-zero', 'finding', kind, 'zero in the numbers this finding does not use');
  }
  switch (kind) {
    case 'verdict':
      return { kind, nonconforming: first === 1 };
    case 'tally':
      return { kind, inspected: first, nonconforming: second };
    case 'exposure':
      return { kind, count: first, exposure: real };
    case 'measurement':
      return { kind, value: real };
  }
}

/** Body: f64 time, u16 product, u16 lot, u32 lot size (0 = not known), reason. */
function eventPart(cursor: ByteCursor, table: Table, kind: LineMark['kind'] | 'lost', head: PartHead): LineMark | Lost {
  const body = cursor.take(16, '');
  const at = checkedMoment(cursor.f64(body));
  const [product, lot, size] = [cursor.u16(body + 8), cursor.u16(body + 10), cursor.u32(body + 12)];
  expectUnused(kind, head, product, lot, size);
  const name = nameAt(table.names, head.named, kind === 'lost' ? 'station' : 'line');
  if (kind === 'lost') return { kind, records: head.records, at, station: name, reason: reasonOf(cursor, head.listed) };
  expectOne(head);
  switch (kind) {
    case 'changeover':
      return { kind, records: 1, at, line: name, product: nameAt(table.names, product, 'product') };
    case 'lot-start':
      return {
        kind, records: 1, at, line: name,
        product: nameAt(table.names, product, 'product'), lot: nameAt(table.names, lot, 'lot'), size: size === 0 ? undefined : size,
      };
    case 'lot-end':
      return { kind, records: 1, at, line: name, lot: nameAt(table.names, lot, 'lot') };
    case 'line-stopped':
      return { kind, records: 1, at, line: name, reason: reasonOf(cursor, head.listed) };
    case 'line-running':
      return { kind, records: 1, at, line: name };
  }
}

function expectUnused(kind: LineMark['kind'] | 'lost', head: PartHead, product: number, lot: number, size: number): void {
  const usesProduct = kind === 'changeover' || kind === 'lot-start';
  const usesLot = kind === 'lot-start' || kind === 'lot-end';
  const usesReason = kind === 'line-stopped' || kind === 'lost';
  if (head.form !== 0 || (!usesProduct && product !== noName) || (!usesLot && lot !== noName)
    || (kind !== 'lot-start' && size !== 0) || (!usesReason && head.listed !== 0)) {
    refuse('reserved-not-zero', '', kind, 'no name, no size, no form and no reason where the kind has none');
  }
}

function expectOne(head: PartHead): void {
  if (head.records !== 1) refuse('out-of-range', 'records', head.records, 'exactly 1');
}

function reasonOf(cursor: ByteCursor, size: number): string {
  const from = cursor.take(size, 'reason');
  // A character takes at most three bytes of UTF-8 for each of its UTF-16 units.
  if (size > 1500) refuse('bad-text', 'reason', size, 'at most 1500 bytes');
  return checkedReason(textOfUtf8(cursor.bytes.subarray(from, cursor.at)) ?? refuse('bad-text', 'reason', size, 'bytes that are UTF-8'));
}
