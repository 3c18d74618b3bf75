import { parsedMoment } from './moment-text.ts';
import { checkedMoment, checkedSequence, checkedWhole } from './checked-words.ts';
import { refuse } from './refusal.ts';

const decimal = /^[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?$/;

/** A number, or the text of one with a decimal point, as CSV has it. */
export function numberOfCell(cell: unknown, field: string): number {
  if (typeof cell === 'number') return cell;
  return typeof cell === 'string' && decimal.test(cell) ? Number(cell) : refuse('wrong-type', field, cell, 'a number with a decimal point');
}

export function wholeOfCell(cell: unknown, field: string, least: 0 | 1): number {
  return checkedWhole(numberOfCell(cell, field), field, least);
}

export function sequenceOfCell(cell: unknown, field: string): number {
  return checkedSequence(numberOfCell(cell, field), field);
}

/** Milliseconds since 1970-01-01 UTC, or a date and time with its distance from UTC (RFC 3339). */
export function momentOfCell(cell: unknown): number {
  if (typeof cell === 'string' && !decimal.test(cell)) {
    return parsedMoment(cell) ?? refuse('bad-time', 'time', cell, 'milliseconds since 1970-01-01 UTC or a time like 2026-12-01T06:30:00.250+01:00');
  }
  return checkedMoment(cell === undefined ? cell : numberOfCell(cell, 'time'));
}
