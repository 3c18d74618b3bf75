import { tailOfConfidence } from '../../core/bound/tail-of.ts';
import type { Tail } from '../../core/units.ts';
import type { Inputs } from './evaluator.ts';

/** A field that holds a number, or a number as text; 'inf' is infinite. */
export function numberOf(inputs: Inputs, field: string): number {
  const value = inputs[field];
  if (value === 'inf') return Infinity;
  const number = typeof value === 'string' && value.trim() !== '' ? Number(value) : value;
  if (typeof number === 'number' && !Number.isNaN(number)) return number;
  throw new Error(`field '${field}' holds ${JSON.stringify(value)}, expected a number`);
}

/** A field that holds a list of numbers. */
export function numbersOf(inputs: Inputs, field: string): readonly number[] {
  const value = inputs[field];
  if (!Array.isArray(value)) throw new Error(`field '${field}' holds ${JSON.stringify(value)}, expected a list`);
  return value.map((_, i) => numberOf(value as unknown as Inputs, String(i)));
}

/** The tail of a row: `alpha` or `tail` as it stands, else the decimal complement of `confidence`. */
export function tailIn(inputs: Inputs): Tail {
  if ('alpha' in inputs) return numberOf(inputs, 'alpha') as Tail;
  if ('tail' in inputs) return numberOf(inputs, 'tail') as Tail;
  const confidence = inputs['confidence'];
  if (typeof confidence === 'string' || typeof confidence === 'number') return tailOfConfidence(confidence);
  throw new Error(`field 'confidence' holds ${JSON.stringify(confidence)}, expected a number`);
}

/** The figure of the side a row asks for. */
export function bySide(inputs: Inputs, figures: { readonly lower: () => number; readonly upper: () => number }): number {
  const side = inputs['side'];
  if (side === 'lower' || side === 'upper') return figures[side]();
  throw new Error(`field 'side' holds ${JSON.stringify(side)}, expected 'lower' or 'upper'`);
}
