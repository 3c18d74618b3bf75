import { lookRules, type BoundMethod } from '../../core/describe/bound-methods.ts';
import { writtenNumber, type Rounding } from '../../core/describe/rounded.ts';
import { briefShare, confidenceText, shareText } from '../../core/describe/share-text.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import { columnNotes } from './column-figures.ts';
import { looksIn, numberIn } from './given.ts';
import { secondComputation, type SecondComputation } from './second-computation.ts';
import type { ToldRequest } from './told-request.ts';

/** A bound with everything a person has to know of it, for print or JSON. */
export interface BoundAnswer {
  readonly quantity: string;
  readonly sentence: string;
  /** the figure, under the name it has in a batch answer too */
  readonly figure: { readonly name: string; readonly value: number };
  readonly side: string | undefined;
  readonly tail: number;
  readonly confidence: string;
  /** what the bound says of the guarantee line, where one was told */
  readonly verdict: string | undefined;
  readonly method: BoundMethod;
  readonly looks: string;
  /** what another library says of the figure; undefined where none can be asked */
  readonly second: SecondComputation | undefined;
  readonly notes: readonly string[];
}

/** @param figure the finite figure of this request */
export function boundAnswer(asked: AskedQuantity, request: ToldRequest, figure: number): BoundAnswer {
  const { given, tail, side, column } = request;
  const confidence = confidenceText(tail);
  const rule = asked.quantity.fields.some(({ name }) => name === 'looks') ? lookRules[looksIn(given)] : lookRules.one;
  const stated = side === undefined ? 'is' : side === 'upper' ? 'is at most' : 'is at least';
  return {
    quantity: asked.command,
    sentence: `${asked.seen(given)}${unitSeen(asked, request)}: at ${confidence} confidence ${asked.subject(given)} ${stated} ${figureText(asked, request, figure)}.`,
    figure: { name: asked.quantity.answer, value: figure },
    side,
    tail,
    confidence,
    verdict: verdictOf(asked, request, figure),
    method: asked.method(given),
    looks: rule,
    second: secondComputation(asked, request, figure),
    notes: [...(column === undefined ? [] : columnNotes(column, side)), ...unchecked(asked, request), ...sigmaKnownFrom(request), ...toleranceOf(asked, request, figure)],
  };
}

function unitSeen({ scale, beside }: AskedQuantity, { unit }: ToldRequest): string {
  return unit !== undefined && beside.includes('unit') && scale === 'rate' ? ` ${unit}` : '';
}

function figureText({ scale }: AskedQuantity, { side, unit, given }: ToldRequest, figure: number): string {
  const rounding: Rounding = side === 'upper' ? 'up' : side === 'lower' ? 'down' : 'nearest';
  switch (scale) {
    case 'share':
      return shareText(figure, rounding);
    case 'rate':
      return `${writtenNumber(figure, 5, rounding)} per ${unit ?? 'unit of exposure'}`;
    case 'measure':
      return `${writtenNumber(figure, 7, rounding)}${unit === undefined ? '' : ` ${unit}`}`;
    case 'units':
      return given['lot_size'] === undefined ? writtenNumber(figure, 15) : `${writtenNumber(figure, 15)}, ${shareText(figure / numberIn(given, 'lot_size'), rounding)}`;
    case 'plain':
      return writtenNumber(figure, 5, rounding);
  }
}

/** The bound held against the line: a promise is demonstrated by the bound on its own side, broken by the other. */
function verdictOf({ promise, scale }: AskedQuantity, { line, side, given }: ToldRequest, figure: number): string | undefined {
  if (line === undefined || promise === undefined || side === undefined) return undefined;
  const bound = scale === 'units' ? figure / numberIn(given, 'lot_size') : figure;
  const atMost = promise === 'asked' ? side === 'upper' : promise === 'at most';
  const written = scale === 'share' || scale === 'units' ? briefShare(line) : writtenNumber(line, 12);
  const promised = `Guarantee line ${written} (${atMost ? 'at most' : 'at least'})`;
  if (atMost === (side === 'upper')) {
    const safe = atMost ? bound <= line : bound >= line;
    return `${promised}: ${safe ? 'demonstrated' : 'not demonstrated; that does not prove it broken'}.`;
  }
  const broken = atMost ? bound > line : bound < line;
  return `${promised}: ${broken ? 'violated' : 'not shown violated'}.`;
}

/** What nobody has checked, said where a model carries the whole statement. */
function unchecked({ beside, command }: AskedQuantity, { column }: ToldRequest): readonly string[] {
  if (column !== undefined || !beside.includes('column') || command === 'mean' || command === 'tolerance-rank') return [];
  return ['Figures alone do not show whether the normal model fits; give the measurements (--csv, --column) to have it checked.'];
}

/** A known standard deviation is worth what its source is worth. */
function sigmaKnownFrom({ given, sigmaSource }: ToldRequest): readonly string[] {
  if (given['sigma'] === undefined) return [];
  return [sigmaSource === undefined ? 'Nobody said where the standard deviation is known from (--sigma-source).' : `The standard deviation is known from: ${sigmaSource}.`];
}

function toleranceOf({ command, quantity }: AskedQuantity, { column }: ToldRequest, figure: number): readonly string[] {
  if (quantity.answer === 'k' && column?.sd !== undefined) {
    const reach = figure * column.sd;
    return [`With the measurements: below ${writtenNumber(column.mean + reach, 7, 'up')}, or else above ${writtenNumber(column.mean - reach, 7, 'down')}.`];
  }
  if (command !== 'tolerance-rank') return [];
  return figure === 0 ? ['Rank 0: not even the outermost of so few measurements bounds this share.'] : ['Rank 1 is the outermost measurement.'];
}
