import type { Correction, Frame, InspectionPart, LineMark, Lost, Part } from '../record/part.ts';
import { newBytes } from '../record/room.ts';
import { bitsForm, findings, kinds, layoutVersion, magic0, magic1, noName, partHeadBytes, tableStart, timeForm } from './binary-layout.ts';
import { namesOf, type FrameNames } from './frame-names.ts';
import { planOf, type PartPlan } from './part-size.ts';
import { utf8Of } from './utf8.ts';
import type { TimeColumn } from '../record/time-column.ts';

const twoTo32 = 4_294_967_296;

/**
 * The binary frame that says what this frame says, each column in its smallest form.
 *
 * @param frame as a reader or frameOf made it: its rules are taken as kept, not checked again
 * @returns bytes of their own, a multiple of 8; never transfer their buffer, it may hold other frames
 */
export function binaryOfFrame(frame: Frame): Uint8Array<ArrayBuffer> {
  const names = namesOf(frame);
  const reasons = frame.parts.map((part) => ('reason' in part ? utf8Of(part.reason) : noReason));
  const plans = frame.parts.map((part, i) => planOf(part, (reasons[i] as Uint8Array).length));
  let at = tableStart + names.table.length;
  const bytes = newBytes(plans.reduce((size, plan) => size + plan.bytes, at));
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  view.setUint8(0, magic0);
  view.setUint8(1, magic1);
  view.setUint8(2, layoutVersion);
  view.setUint16(4, frame.parts.length, true);
  setU64(view, 8, frame.first);
  bytes.set(names.table, tableStart);
  frame.parts.forEach((part, i) => {
    const plan = plans[i] as PartPlan;
    writePart(view, at, part, plan, names, reasons[i] as Uint8Array);
    at += plan.bytes;
  });
  return bytes;
}

const noReason = new Uint8Array(0);

function setU64(view: DataView, at: number, value: number): void {
  view.setUint32(at, value % twoTo32, true);
  view.setUint32(at + 4, Math.floor(value / twoTo32), true);
}

function writePart(view: DataView, at: number, part: Part, plan: PartPlan, names: FrameNames, reason: Uint8Array): void {
  const form = part.kind === 'correction' ? findings.indexOf(part.finding.kind) : plan.form;
  view.setUint8(at, kinds.indexOf(part.kind) + 1);
  view.setUint8(at + 1, form);
  view.setUint16(at + 2, 'origin' in part ? names.placeOfOrigin(part.origin) : names.placeOf(part.kind === 'lost' ? part.station : part.line), true);
  view.setUint32(at + 4, part.records, true);
  view.setUint32(at + 8, plan.listed, true);
  const body = at + partHeadBytes;
  if (part.kind === 'correction') writeCorrection(view, body, part);
  else if ('origin' in part) writeColumns(view, writeTimes(view, body, part.time, plan), part, form);
  else writeEvent(view, body, part, names);
  if (reason.length > 0) new Uint8Array(view.buffer, view.byteOffset + body + (part.kind === 'correction' ? 32 : 16)).set(reason);
}

/** Returns where the columns behind the times begin. */
function writeTimes(view: DataView, at: number, time: TimeColumn, { form, base }: PartPlan): number {
  if (time.kind === 'steady') {
    view.setFloat64(at, time.start, true);
    view.setFloat64(at + 8, time.step, true);
    return at + 16;
  }
  if ((form & 3) === timeForm.each) return writeF64(view, at, time.times);
  view.setFloat64(at, base, true);
  const { times } = time;
  for (let i = 0; i < times.length; i += 1) view.setUint32(at + 8 + i * 4, (times[i] as number) - base, true);
  return at + 8 + Math.ceil(times.length / 2) * 8;
}

function writeColumns(view: DataView, at: number, part: InspectionPart, form: number): void {
  switch (part.kind) {
    case 'verdicts':
      if (form < bitsForm) writeU32(view, at, part.nonconforming);
      else for (const place of part.nonconforming) view.setUint8(at + (place >>> 3), view.getUint8(at + (place >>> 3)) | (1 << (place & 7)));
      return;
    case 'tallies':
      writeU32(view, writeU32(view, at, part.inspected), part.nonconforming);
      return;
    case 'exposures':
      writeU32(view, writeF64(view, at, part.exposure), part.count);
      return;
    case 'measurements':
      writeF64(view, at, part.value);
  }
}

function writeU32(view: DataView, at: number, column: Uint32Array): number {
  for (let i = 0; i < column.length; i += 1) view.setUint32(at + i * 4, column[i] as number, true);
  return at + column.length * 4;
}

function writeF64(view: DataView, at: number, column: Float64Array): number {
  for (let i = 0; i < column.length; i += 1) view.setFloat64(at + i * 8, column[i] as number, true);
  return at + column.length * 8;
}

function writeCorrection(view: DataView, at: number, { at: time, corrects, finding }: Correction): void {
  view.setFloat64(at, time, true);
  setU64(view, at + 8, corrects);
  switch (finding.kind) {
    case 'verdict':
      view.setUint32(at + 16, finding.nonconforming ? 1 : 0, true);
      return;
    case 'tally':
      view.setUint32(at + 16, finding.inspected, true);
      view.setUint32(at + 20, finding.nonconforming, true);
      return;
    case 'exposure':
      view.setUint32(at + 16, finding.count, true);
      view.setFloat64(at + 24, finding.exposure, true);
      return;
    case 'measurement':
      view.setFloat64(at + 24, finding.value, true);
  }
}

function writeEvent(view: DataView, at: number, part: LineMark | Lost, names: FrameNames): void {
  view.setFloat64(at, part.at, true);
  view.setUint16(at + 8, 'product' in part ? names.placeOf(part.product) : noName, true);
  view.setUint16(at + 10, 'lot' in part ? names.placeOf(part.lot) : noName, true);
  view.setUint32(at + 12, part.kind === 'lot-start' ? (part.size ?? 0) : 0, true);
}
