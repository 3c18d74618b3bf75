import { figureOf, type NoFigure } from './figure-of.ts';
import { TailReader, type Given } from './given.ts';
import { quantities } from './quantities.ts';
import type { Quantity } from './quantity.ts';

const always: readonly string[] = ['quantity', 'confidence', 'tail'];
const known: ReadonlyMap<Quantity, ReadonlySet<string>> = new Map(
  [...quantities.values()].map((quantity) => [quantity, new Set([...always, ...quantity.fields.map(({ name }) => name)])]),
);

/**
 * Answers requests for bounds, one JSON object a line: `{"bound": …}` (or `k`, `n`, `rank`), or `{"error": …}`
 * with the field at fault where there is one. One for a batch: it remembers the last confidence level.
 */
export class BatchAnswers {
  readonly #tails = new TailReader();
  readonly #tailIn = (given: Given) => this.#tails.tailIn(given);

  /** @returns JSON text without a line end, whatever the line holds */
  answer(line: string): string {
    let request: unknown;
    try {
      request = JSON.parse(line);
    } catch (cause) {
      return wrong(`not JSON: ${(cause as SyntaxError).message}`, undefined);
    }
    if (typeof request !== 'object' || request === null || Array.isArray(request)) return wrong('expected a JSON object', undefined);
    return this.#answerTo(request as Given);
  }

  #answerTo(given: Given): string {
    const name = given['quantity'];
    const quantity = typeof name === 'string' ? quantities.get(name) : undefined;
    if (quantity === undefined) return wrong(`quantity is ${JSON.stringify(name) ?? '(missing)'}, expected one of ${[...quantities.keys()].join(', ')}`, 'quantity');
    const fields = known.get(quantity);
    for (const field in given) {
      if (fields?.has(field) !== true) return wrong(`${quantity.name} has no field ${JSON.stringify(field)}; it has ${[...(fields ?? [])].join(', ')}`, field);
    }
    const figure = figureOf(quantity, given, this.#tailIn);
    if (!figure.ok) return refusal(figure.fault);
    return `{"${quantity.answer}":${figure.value}}`;
  }
}

function refusal({ field, because }: NoFigure): string {
  return wrong(field === undefined ? because : `${field} ${because}`, field);
}

/** The answer to a request that cannot be met. */
export function wrong(error: string, field: string | undefined): string {
  return JSON.stringify({ error, field });
}
