import type { Amount } from '../figure/amount.ts';
import type { Complain } from './complain.ts';
import type { GuaranteeFile } from './guarantee-schema.ts';
import type { PromiseReading } from './promise-reading.ts';

/** Reads a rate guarantee; target and normal rate are given over the same exposure as the line, so none is rescaled. */
export function rateOf(file: Extract<GuaranteeFile, { quantity: 'rate' }>, complain: Complain): PromiseReading | undefined {
  const { value: atMost, per, unit } = file['at-most'];
  const same = (amount: Amount | undefined, field: string): number | undefined => {
    if (amount === undefined || (amount.per === per && amount.unit === unit)) return amount?.value;
    return void complain([field], `an amount per ${per} ${unit}, as the guarantee line has`);
  };
  const target = same(file.target, 'target') ?? 0;
  const normalRate = same(file['normal-rate'], 'normal-rate');
  if (!(atMost > 0)) return void complain(['at-most'], 'an amount above 0; no evidence can demonstrate 0');
  if (target >= atMost) return void complain(['target'], 'a target below the guarantee line');
  if (normalRate !== undefined && normalRate >= atMost) return void complain(['normal-rate'], 'a normal rate below the guarantee line');
  return { promise: { quantity: 'rate', atMost, per, unit, target }, normalRate, counted: undefined };
}
