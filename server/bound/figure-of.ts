import { OutOfDomain } from '../../core/bound/out-of-domain.ts';
import { NoConvergence } from '../../core/numerics/no-convergence.ts';
import { fault, ok, type Result } from '../../core/result.ts';
import type { Tail } from '../../core/units.ts';
import type { Given } from './given.ts';
import type { Quantity } from './quantity.ts';

/** Why there is no figure: the field at fault, as far as there is one, and what is to be said of it. */
export interface NoFigure {
  readonly field: string | undefined;
  /** follows the field's name ('is -1, expected …'), or stands alone */
  readonly because: string;
}

/**
 * The figure that a quantity has for these fields.
 *
 * @param tail reads the tail out of the fields; may throw OutOfDomain
 * @returns a finite number, or what stands against it
 */
export function figureOf(quantity: Quantity, given: Given, tail: (given: Given) => Tail): Result<number, NoFigure> {
  try {
    const figure = quantity.compute(given, tail(given));
    if (Number.isFinite(figure)) return ok(figure);
    return fault({ field: undefined, because: `these figures bound nothing: the ${quantity.answer} is ${figure}` });
  } catch (cause) {
    if (cause instanceof OutOfDomain) return fault(domainFault(quantity, cause));
    if (cause instanceof NoConvergence) return fault({ field: undefined, because: cause.message });
    throw cause;
  }
}

/** Core names its arguments; a request is told by its own field. */
export function domainFault({ named }: Quantity, { argument, value, expected }: OutOfDomain): NoFigure {
  return { field: named[argument] ?? argument, because: `is ${String(value)}, expected ${expected}` };
}
