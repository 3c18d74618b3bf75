import { amountOf } from '../../core/figure/amount.ts';
import type { Tail } from '../../core/units.ts';
import { CommandFault } from '../cli/exit-codes.ts';
import { badOption, required, toldNumber, toldShare, toldTail } from '../cli/told-figures.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import { columnFigures, type ColumnFigures } from './column-figures.ts';
import { BadColumn, columnOf } from './csv-column.ts';
import type { Given, Side } from './given.ts';
import { limitDistance } from './limit-distance.ts';
import type { Field } from './quantity.ts';
import { flagOf, text, type Told } from './told.ts';

/** A question as it was told on the command line: the request for the figure, and what is to be said beside it. */
export interface ToldRequest {
  readonly given: Given;
  readonly tail: Tail;
  readonly side: Side | undefined;
  /** guarantee line, a share or in the unit of the bound */
  readonly line: number | undefined;
  readonly unit: string | undefined;
  /** where a known standard deviation is known from */
  readonly sigmaSource: string | undefined;
  readonly column: ColumnFigures | undefined;
}

/** @throws CommandFault naming the option, what it held and what was expected */
export async function toldRequest(asked: AskedQuantity, told: Told): Promise<ToldRequest> {
  const tail = toldTail('confidence', required('confidence', text(told, 'confidence'), 'a confidence level, e.g. 95 % or 0.95'));
  const side = sideOf(asked, told);
  const column = await toldColumn(told);
  const given: Record<string, unknown> = {};
  for (const field of asked.quantity.fields) {
    const value = fieldOf(field, told);
    if (value !== undefined) given[field.name] = value;
  }
  if (side !== undefined) given['side'] = side;
  const line = lineOf(asked, told);
  if (line !== undefined && asked.quantity.fields.some(({ name }) => name === 'line')) given['line'] = line;
  if (column !== undefined) takeColumn(asked, given, column);
  if (asked.beside.includes('limits')) Object.assign(given, limitDistance(asked, told, given, column));
  for (const helper of ['mean', 'sd']) if (!asked.quantity.fields.some(({ name }) => name === helper)) delete given[helper];
  return { given, tail, side, line, unit: text(told, 'unit'), sigmaSource: text(told, 'sigma-source'), column };
}

function fieldOf({ name, form }: Field, told: Told): unknown {
  if (name === 'line' || name === 'side') return undefined;
  if (form === 'stations') return stationsOf(told['station']);
  const flag = flagOf(name);
  const value = text(told, flag);
  if (value === undefined) return undefined;
  if (form === 'number') return toldNumber(flag, value);
  if (form === 'share') return toldShare(flag, value);
  if (form.includes(value)) return value;
  throw badOption(flag, value, `one of ${form.join(', ')}`);
}

function sideOf({ command, quantity, usualSide }: AskedQuantity, told: Told): Side | undefined {
  if (!quantity.fields.some(({ name }) => name === 'side')) return undefined;
  const value = text(told, 'side') ?? usualSide;
  if (value === undefined) throw new CommandFault(`--side is missing; expected lower or upper: a promise about a ${command} can be of either kind`);
  if (value === 'lower' || value === 'upper') return value;
  throw badOption('side', value, 'lower or upper');
}

function lineOf({ scale }: AskedQuantity, told: Told): number | undefined {
  const value = text(told, 'line');
  if (value === undefined) return undefined;
  if (scale === 'share' || scale === 'units') return toldShare('line', value);
  const amount = scale === 'rate' ? amountOf(value) : undefined;
  return amount === undefined ? toldNumber('line', value) : amount.value / amount.per;
}

/** Stations told as NAME=NONCONFORMING/N. */
function stationsOf(told: Told[string]): unknown {
  if (!Array.isArray(told)) return undefined;
  return (told as readonly string[]).map((entry) => {
    const parts = /^(\S+)=(\d+)\/(\d+)$/.exec(entry.trim());
    if (parts === null) throw badOption('station', entry, 'NAME=NONCONFORMING/INSPECTED, e.g. crimp=3/12000');
    return { station: parts[1], nonconforming: Number(parts[2]), n: Number(parts[3]) };
  });
}

async function toldColumn(told: Told): Promise<ColumnFigures | undefined> {
  const [path, column] = [text(told, 'csv'), text(told, 'column')];
  if (path === undefined && column === undefined) return undefined;
  const file = required('csv', path, 'the CSV file that has the column');
  const name = required('column', column, 'the name of a column in the CSV file');
  try {
    return columnFigures(await columnOf(file, name));
  } catch (cause) {
    if (cause instanceof BadColumn) throw new CommandFault(cause.message);
    if ((cause as NodeJS.ErrnoException).code !== undefined) throw badOption('csv', file, `a file that can be read (${(cause as Error).message})`);
    throw cause;
  }
}

/** Puts the figures of a column where the quantity or its limits ask for them. */
function takeColumn({ quantity, beside }: AskedQuantity, given: Record<string, unknown>, { n, mean, sd }: ColumnFigures): void {
  const wanted = (name: string): boolean => quantity.fields.some((field) => field.name === name) || (beside.includes('limits') && name !== 'n');
  for (const [name, value] of Object.entries({ n, mean, sd })) {
    if (!wanted(name)) continue;
    if (given[name] !== undefined) throw new CommandFault(`--${name} and --csv: give figures or a column, not both`);
    if (name === 'sd' && given['sigma'] !== undefined) continue;
    if (value !== undefined) given[name] = value;
  }
}
