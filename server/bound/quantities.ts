import { attributeQuantities } from './attribute-quantities.ts';
import { inspectedFraction } from './inspected-quantity.ts';
import { measurementQuantities } from './measurement-quantities.ts';
import type { Quantity } from './quantity.ts';

/** Everything a bound can be asked for, by request or by command. */
export const quantities: ReadonlyMap<string, Quantity> = new Map(
  [...attributeQuantities, inspectedFraction, ...measurementQuantities].map((quantity) => [quantity.name, quantity]),
);

/** @throws RangeError for a name that is none of ours: a slip in the code, not in a request */
export function quantityNamed(name: string): Quantity {
  const quantity = quantities.get(name);
  if (quantity === undefined) throw new RangeError(`no quantity is called ${name}`);
  return quantity;
}
