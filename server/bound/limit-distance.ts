import { CommandFault } from '../cli/exit-codes.ts';
import { required, toldNumber } from '../cli/told-figures.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import type { ColumnFigures } from './column-figures.ts';
import type { Given } from './given.ts';
import { text, type Told } from './told.ts';

/** A specification limit, and on which side of it units are beyond. */
export interface ToldLimit {
  readonly name: 'LSL' | 'USL';
  readonly value: number;
}

/** The one limit that was told; undefined where none was. */
export function toldLimit(told: Told): ToldLimit | undefined {
  const [lsl, usl] = [text(told, 'lsl'), text(told, 'usl')];
  if (lsl !== undefined && usl !== undefined) throw new CommandFault('--lsl and --usl: one limit at a time; each has its own bound');
  if (lsl !== undefined) return { name: 'LSL', value: toldNumber('lsl', lsl) };
  return usl === undefined ? undefined : { name: 'USL', value: toldNumber('usl', usl) };
}

/**
 * The distance of the mean from a limit in standard deviations (`k`), or a third of it (`estimate`), where it is not
 * told itself: from mean and sd, told or of the column.
 */
export function limitDistance({ quantity }: AskedQuantity, told: Told, given: Given, column: ColumnFigures | undefined): Given {
  const [field, share] = quantity.fields.some(({ name }) => name === 'k') ? (['k', 1] as const) : (['estimate', 3] as const);
  if (text(told, 'method') === 'counted') return {};
  const limit = toldLimit(told);
  const parts = [...(column === undefined ? [] : ['csv']), ...['mean', 'sd', 'lsl', 'usl'].filter((flag) => text(told, flag) !== undefined)];
  if (given[field] !== undefined) {
    if (parts.length > 0) throw new CommandFault(`--${field} and --${parts[0] ?? ''}: give the figure itself or what it is made of, not both`);
    return {};
  }
  if (limit === undefined) throw new CommandFault(`--${field} is missing; expected it, or a specification limit (--lsl or --usl) with --mean and --sd or a column`);
  const mean = column?.mean ?? toldNumber('mean', required('mean', text(told, 'mean'), 'the average of the measurements'));
  const sd = column === undefined ? toldNumber('sd', required('sd', text(told, 'sd'), 'their sample standard deviation')) : column.sd;
  if (sd === undefined || !(sd > 0)) throw new CommandFault(`--sd: ${sd ?? 'none'}; expected measurements that differ: without spread there is no distance in standard deviations`);
  const distance = (limit.name === 'USL' ? limit.value - mean : mean - limit.value) / sd;
  return { [field]: distance / share };
}
