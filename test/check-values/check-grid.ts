import type { Inputs } from './evaluator.ts';
import { outcomeOf, relativeError, type Outcome } from './outcome.ts';
import { gridEvaluatorOf } from './registry.ts';

export interface Grid {
  readonly quantity: string;
  readonly columns: readonly string[];
  readonly rows: readonly (readonly unknown[])[];
}

/** Every row of a grid against the function that answers its quantity. */
export function checkGrid(grid: Grid): readonly Outcome[] {
  const evaluator = gridEvaluatorOf(grid.quantity);
  return grid.rows.map((cells) => {
    const row = JSON.stringify(cells);
    if (evaluator === undefined) return { kind: 'unanswered', row };
    const inputs: Inputs = Object.fromEntries(grid.columns.map((column, i) => [column, cells[i]]));
    return outcomeOf(row, () => {
      const expected = Number(inputs[evaluator.answer]);
      const found = evaluator.compute(inputs);
      const error = relativeError(found, expected);
      return { error, within: evaluator.exact ? found === expected : error <= 1e-12, found: String(found) };
    });
  });
}
