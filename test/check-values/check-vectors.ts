import type { Answer, Inputs } from './evaluator.ts';
import { outcomeOf, relativeError, type Outcome } from './outcome.ts';
import { vectorEvaluatorOf } from './registry.ts';

type Printed = number | string;

export interface Vector {
  readonly fn: string;
  readonly inputs: Inputs;
  readonly output: Printed | readonly Printed[] | Readonly<Record<string, Printed>>;
}

/** Every test vector against the function of its name; of several figures the worst counts. */
export function checkVectors(vectors: readonly Vector[]): readonly Outcome[] {
  return vectors.map((vector) => {
    const row = `${vector.fn} ${JSON.stringify(vector.inputs)} = ${JSON.stringify(vector.output)}`;
    const evaluator = vectorEvaluatorOf(vector.fn);
    if (evaluator === undefined) return { kind: 'unanswered', row };
    return outcomeOf(row, () => {
      const found = evaluator.compute(vector.inputs);
      const error = worstError(found, vector.output);
      return { error, within: error <= (evaluator.tolerance ?? 1e-12), found: JSON.stringify(found) };
    });
  });
}

function worstError(found: Answer, expected: Vector['output']): number {
  if (typeof expected !== 'object') return typeof found === 'number' ? relativeError(found, Number(expected)) : Infinity;
  if (typeof found !== 'object') return Infinity;
  const byName = new Map<string, number>(Object.entries<number>(found));
  const wanted = Object.entries<Printed>(expected);
  return Math.max(...wanted.map(([name, value]) => relativeError(byName.get(name) ?? NaN, Number(value))));
}
