import type { Part } from '../record/part.ts';

/** Fields of each kind of part in the JSON form; `least` of them have to be there, the others may be left out. */
export const partFields: Readonly<Record<Part['kind'], { readonly fields: readonly string[]; readonly least: number }>> = {
  verdicts: { fields: ['kind', 'station', 'product', 'characteristic', 'lot', 'time', 'units', 'nonconforming'], least: 7 },
  tallies: { fields: ['kind', 'station', 'product', 'characteristic', 'lot', 'time', 'inspected', 'nonconforming'], least: 7 },
  exposures: { fields: ['kind', 'station', 'product', 'characteristic', 'lot', 'time', 'count', 'exposure'], least: 7 },
  measurements: { fields: ['kind', 'station', 'product', 'characteristic', 'lot', 'time', 'value'], least: 6 },
  correction: { fields: ['kind', 'station', 'product', 'characteristic', 'lot', 'time', 'corrects', 'finding', 'reason'], least: 8 },
  changeover: { fields: ['kind', 'line', 'product', 'time'], least: 4 },
  'lot-start': { fields: ['kind', 'line', 'product', 'lot', 'size', 'time'], least: 5 },
  'lot-end': { fields: ['kind', 'line', 'lot', 'time'], least: 4 },
  'line-stopped': { fields: ['kind', 'line', 'reason', 'time'], least: 4 },
  'line-running': { fields: ['kind', 'line', 'time'], least: 3 },
  lost: { fields: ['kind', 'station', 'records', 'reason', 'time'], least: 5 },
};
