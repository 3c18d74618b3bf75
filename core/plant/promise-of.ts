import type { Complain } from './complain.ts';
import type { Measure, Share } from './figure-schemas.ts';
import type { GuaranteeFile } from './guarantee-schema.ts';
import { meanOf } from './mean-of.ts';
import type { MeasureReader } from './measure-reader.ts';
import type { Counted, PromiseReading } from './promise-reading.ts';
import { rateOf } from './rate-of.ts';
import type { Fraction } from '../units.ts';

/** Reads line, target and normal rate of a guarantee and checks that they stand in order; complains where not. */
export function promiseOf(file: GuaranteeFile, measure: MeasureReader, complain: Complain): PromiseReading | undefined {
  switch (file.quantity) {
    case 'nonconforming-fraction':
    case 'lot-fraction': {
      const read = fractionAtMost(file, complain);
      return read && { promise: { quantity: file.quantity, atMost: read.counted.line, target: read.counted.target }, ...read };
    }
    case 'yield':
    case 'chained-yield': {
      const read = fractionAtLeast(file, complain);
      if (read === undefined) return undefined;
      const { atLeast, target, counted, normalRate } = read;
      return file.quantity === 'yield'
        ? { promise: { quantity: 'yield', atLeast, target, atMostNonconforming: counted.line }, counted, normalRate }
        : { promise: { quantity: 'chained-yield', atLeast, target }, counted, normalRate };
    }
    case 'fraction-beyond-limit': {
      const read = fractionAtMost(file, complain);
      const limit = limitOf(file['specification-limit'], measure, complain);
      if (read === undefined || limit === undefined) return undefined;
      const model = file.model ?? 'counted';
      const { line, target } = read.counted;
      return {
        promise: { quantity: 'fraction-beyond-limit', atMost: line, target, limit, unit: measure.unit, model },
        normalRate: read.normalRate,
        counted: model === 'counted' ? read.counted : undefined,
      };
    }
    case 'rate':
      return rateOf(file, complain);
    case 'mean':
      return meanOf(file, measure, complain);
  }
}

interface ShareFields {
  readonly target?: Share | undefined;
  readonly 'normal-rate'?: Share | undefined;
}

interface FractionReading {
  readonly counted: Counted;
  readonly normalRate: Fraction | undefined;
}

const none: Share = { share: 0 as Fraction, complement: 1 as Fraction };
const all: Share = { share: 1 as Fraction, complement: 0 as Fraction };

function fractionAtMost(file: ShareFields & { readonly 'at-most': Share }, complain: Complain): FractionReading | undefined {
  const line = file['at-most'].share;
  const target = (file.target ?? none).share;
  const well = file['normal-rate']?.share;
  if (!inside(line)) return void complain(['at-most'], 'a share above 0 and below 100 %; no evidence can demonstrate 0');
  if (target >= line) return void complain(['target'], 'a target below the guarantee line');
  if (well !== undefined && well >= line) return void complain(['normal-rate'], 'a normal rate below the guarantee line');
  return { counted: { line, target, well }, normalRate: well };
}

function fractionAtLeast(
  file: ShareFields & { readonly 'at-least': Share },
  complain: Complain,
): (FractionReading & { readonly atLeast: Fraction; readonly target: Fraction }) | undefined {
  const { share: atLeast, complement: line } = file['at-least'];
  const { share: target, complement } = file.target ?? all;
  const normal = file['normal-rate'];
  if (!inside(atLeast)) return void complain(['at-least'], 'a share above 0 and below 100 %; no evidence can demonstrate 100 %');
  if (target <= atLeast) return void complain(['target'], 'a target above the guarantee line');
  if (normal !== undefined && normal.share <= atLeast) return void complain(['normal-rate'], 'a normal rate above the guarantee line');
  return { atLeast, target, counted: { line, target: complement, well: normal?.complement }, normalRate: normal?.share };
}

const inside = (share: number): boolean => share > 0 && share < 1;

type LimitFile = Extract<GuaranteeFile, { quantity: 'fraction-beyond-limit' }>['specification-limit'];

function limitOf(
  { below, above }: LimitFile,
  measure: MeasureReader,
  complain: Complain,
): { readonly side: 'below' | 'above'; readonly value: number } | undefined {
  const path = ['specification-limit'];
  const [side, limit]: ['below' | 'above', Measure | undefined] = below === undefined ? ['above', above] : ['below', below];
  if (limit === undefined || (below !== undefined && above !== undefined)) {
    return void complain(path, 'either below, for a lower limit, or above, for an upper one');
  }
  const value = measure.read(limit, [...path, side]);
  return value === undefined ? undefined : { side, value };
}
