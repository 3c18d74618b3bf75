import { newColumn } from '../record/room.ts';
import { noPlaces } from '../record/no-places.ts';
import { refuse } from '../record/refusal.ts';
import type { TimeColumn } from '../record/time-column.ts';
import { expectFields, objectAt } from './json-object.ts';

/** Columns of the JSON form; `most` is how many records the frame may still hold, asked before memory is spent. */

export function wholeColumn(value: unknown, field: string, most: number): Uint32Array {
  const items = arrayAt(value, field, most);
  if (items.length === 0) return noPlaces;
  const column = new Uint32Array(items.length);
  for (let i = 0; i < items.length; i += 1) {
    const item = items[i];
    if (typeof item !== 'number' || item >>> 0 !== item) refuse('out-of-range', `${field}[${i}]`, item, 'a whole number from 0 to 4,294,967,295');
    column[i] = item;
  }
  return column;
}

export function numberColumn(value: unknown, field: string, most: number): Float64Array {
  const items = arrayAt(value, field, most);
  const column = newColumn(items.length);
  for (let i = 0; i < items.length; i += 1) {
    const item = items[i];
    if (typeof item !== 'number') refuse('wrong-type', `${field}[${i}]`, item, 'a number');
    column[i] = item;
  }
  return column;
}

/** A moment for all records, an array with a moment for each, or an even pace {start, step}. */
export function timeColumn(value: unknown, most: number): TimeColumn {
  if (typeof value === 'number') return { kind: 'steady', start: value, step: 0 };
  if (Array.isArray(value)) {
    const only: unknown = value[0];
    if (value.length === 1 && typeof only === 'number' && Number.isInteger(only)) return { kind: 'steady', start: only, step: 0 };
    return { kind: 'each', times: numberColumn(value, 'time', most) };
  }
  const pace = objectAt(value, 'time', 'milliseconds, an array of milliseconds, or {"start", "step"}');
  expectFields(pace, 2, paceFields, 'time.');
  return { kind: 'steady', start: numberAt(pace.start, 'time.start'), step: numberAt(pace.step, 'time.step') };
}

const paceFields = ['start', 'step'];

export function numberAt(value: unknown, field: string): number {
  return typeof value === 'number' ? value : refuse('wrong-type', field, value, 'a number');
}

function arrayAt(value: unknown, field: string, most: number): readonly unknown[] {
  if (!Array.isArray(value)) return refuse('wrong-type', field, value, 'an array of numbers');
  if (value.length > most) refuse('too-many-records', field, value, `at most ${most} records more in this frame`);
  return value;
}
