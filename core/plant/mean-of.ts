import type { Complain } from './complain.ts';
import type { GuaranteeFile } from './guarantee-schema.ts';
import type { MeasureReader } from './measure-reader.ts';
import type { PromiseReading } from './promise-reading.ts';

type MeanFile = Extract<GuaranteeFile, { quantity: 'mean' }>;
type Side = 'at-least' | 'at-most';

/** Reads a guarantee of a mean, its side told by which of at-least and at-most is there. */
export function meanOf(file: MeanFile, measure: MeasureReader, complain: Complain): PromiseReading | undefined {
  const side: Side = file['at-least'] === undefined ? 'at-most' : 'at-least';
  const written = file[side];
  if (written === undefined || (file['at-least'] !== undefined && file['at-most'] !== undefined)) {
    return void complain(['at-least'], 'either at-least or at-most');
  }
  const line = measure.read(written, [side]);
  const target = measure.read(file.target, ['target']);
  const normalRate = file['normal-rate'] && measure.read(file['normal-rate'], ['normal-rate']);
  if (line === undefined || target === undefined) return undefined;
  const good = (value: number): boolean => (side === 'at-least' ? value > line : value < line);
  const where = side === 'at-least' ? 'above' : 'below';
  if (!good(target)) return void complain(['target'], `a target ${where} the guarantee line`);
  if (normalRate !== undefined && !good(normalRate)) {
    return void complain(['normal-rate'], `a mean of the well line ${where} the guarantee line`);
  }
  const sigma = sigmaOf(file, measure, complain);
  const range = rangeOf(file, line, measure, complain);
  return { promise: { quantity: 'mean', side, line, target, unit: measure.unit, sigma, range }, normalRate, counted: undefined };
}

function sigmaOf({ sigma, range }: MeanFile, measure: MeasureReader, complain: Complain): { value: number; source: string } | undefined {
  const value = sigma && measure.read(sigma.value, ['sigma', 'value']);
  if (sigma === undefined || value === undefined) return undefined;
  if (!(value > 0)) return void complain(['sigma', 'value'], 'a standard deviation above 0');
  if (range !== undefined) return void complain(['sigma'], 'either sigma or range: each asks for another bound');
  return { value, source: sigma.source };
}

function rangeOf({ range }: MeanFile, line: number, measure: MeasureReader, complain: Complain): { from: number; to: number } | undefined {
  const from = range && measure.read(range.from, ['range', 'from']);
  const to = range && measure.read(range.to, ['range', 'to']);
  if (from === undefined || to === undefined) return undefined;
  if (from < line && line < to) return { from, to };
  return void complain(['range'], 'a range with the guarantee line inside it');
}
