import { knownErrorLower, knownErrorUpper, triedErrorLower, triedErrorUpper, type InspectionRefusal } from '../../core/bound/inspection-error.ts';
import { meldedErrorLower, meldedErrorUpper } from '../../core/bound/melded-error.ts';
import { OutOfDomain } from '../../core/bound/out-of-domain.ts';
import type { Result } from '../../core/result.ts';
import { choiceIn, numberIn, sideIn } from './given.ts';
import { side, units, type Quantity } from './quantity.ts';

const methods = ['exact', 'melded'] as const;

/** The true nonconforming fraction behind a station that errs. */
export const inspectedFraction: Quantity = {
  name: 'inspected-fraction',
  answer: 'bound',
  fields: [
    units,
    { name: 'rejected', form: 'number', help: 'units that the station rejected, right or wrong, whole, 0 to n' },
    side,
    { name: 'sensitivity', form: 'share', help: 'chance that it rejects a nonconforming unit, where known' },
    { name: 'false_reject', form: 'share', help: 'chance that it rejects a conforming unit, where known' },
    { name: 'seeded', form: 'number', help: 'where tried instead: units known not to conform that were tried' },
    { name: 'caught', form: 'number', help: 'of these, rejected' },
    { name: 'good', form: 'number', help: 'units known to conform that were tried' },
    { name: 'rejected_good', form: 'number', help: 'of these, rejected' },
    { name: 'method', form: methods, help: 'for tried errors: exact when absent (three exact bounds together), or melded' },
  ],
  named: { inspected: 'n', nonconforming: 'rejected', falseReject: 'false_reject', rejectedGood: 'rejected_good' },
  compute(given, tail) {
    const seen = { rejected: numberIn(given, 'rejected'), inspected: numberIn(given, 'n') };
    const upper = sideIn(given) === 'upper';
    const melded = choiceIn(given, 'method', methods, 'exact') === 'melded';
    if (given['sensitivity'] !== undefined || given['false_reject'] !== undefined) {
      const tried = ['seeded', 'caught', 'good', 'rejected_good', ...(melded ? ['method'] : [])].find((name) => given[name] !== undefined);
      if (tried !== undefined) throw new OutOfDomain(tried, given[tried], 'errors that are known or errors that were tried, not both');
      const error = { sensitivity: numberIn(given, 'sensitivity'), falseReject: numberIn(given, 'false_reject') };
      return settled((upper ? knownErrorUpper : knownErrorLower)(seen, error, tail));
    }
    const error = { seeded: numberIn(given, 'seeded'), caught: numberIn(given, 'caught'), good: numberIn(given, 'good'), rejectedGood: numberIn(given, 'rejected_good') };
    if (melded) return settled((upper ? meldedErrorUpper : meldedErrorLower)(seen, error, tail));
    return settled((upper ? triedErrorUpper : triedErrorLower)(seen, error, tail));
  },
};

function settled(result: Result<number, InspectionRefusal>): number {
  if (result.ok) return result.value;
  throw new OutOfDomain('station', result.fault.kind, `a station that can be corrected for: ${result.fault.because}`);
}
