import type { Finding, Part } from '../record/part.ts';

/**
 * The binary frame, version 1, little endian throughout; every part begins at a multiple of 8 bytes.
 *
 * frame   0 'V'  1 'F'  2 version  3 zero  4 u16 parts  6 u16 zero  8 u64 first sequence
 *         16 u16 names  18 u16 origins  20 u32 table bytes  24 table, then the parts
 * table   origins: u16 station, product, characteristic, lot (places in the list of names, none = 0xFFFF);
 *         names: u8 length, ASCII; zeros up to a multiple of 8
 * part    0 u8 kind  1 u8 form  2 u16 origin or name  4 u32 records  8 u32 listed  12 u32 zero  16 body, zeros to a multiple of 8
 */
export const magic0 = 0x56;
export const magic1 = 0x46;
export const layoutVersion = 1;
/** Bytes before the table. */
export const headBytes = 24;
/** Where the table's own counts begin: from here to the table's end is what one connection repeats. */
export const tableStart = 16;
export const originBytes = 8;
/** Bytes of a part before its body. */
export const partHeadBytes = 16;
/** Stands for a name that is not there. */
export const noName = 0xffff;

/** Codes of the kinds, in the order of this list, from 1. */
export const kinds = [
  'verdicts', 'tallies', 'exposures', 'measurements', 'correction',
  'changeover', 'lot-start', 'lot-end', 'line-stopped', 'line-running', 'lost',
] as const satisfies readonly Part['kind'][];

/** Codes of the findings of a correction, in the order of this list, from 0. */
export const findings = ['verdict', 'tally', 'exposure', 'measurement'] as const satisfies readonly Finding['kind'][];

/** Form byte of an inspection part: the two low bits say how times stand, bit 2 how nonconforming places do. */
export const timeForm = { steady: 0, offsets: 1, each: 2 } as const;
/** Set: a bit a unit, lowest bit first; not set: a list of u32 places. */
export const bitsForm = 4;

/** The next multiple of 8. */
export function padded(bytes: number): number {
  return Math.ceil(bytes / 8) * 8;
}
