import type { Inputs } from './evaluator.ts';
import { outcomeOf, relativeError, type Outcome } from './outcome.ts';
import { publishedEvaluatorOf } from './registry.ts';

export interface Published {
  readonly id: string;
  readonly quantity: string;
  readonly inputs: Inputs;
  readonly value_text: string;
  readonly decimals: number;
  readonly rounding: 'nearest' | 'up' | 'exact';
  readonly agrees: boolean;
  readonly recomputed?: string;
  readonly note?: string;
}

/**
 * Every published row to its printed digits. A row marked as not agreeing is named with its reason;
 * what core finds there is held against the recomputed value instead. The relative error that is
 * reported is always the one against the recomputed value; the printed one is rounded.
 */
export function checkPublished(rows: readonly Published[]): readonly Outcome[] {
  return rows.flatMap((row): readonly Outcome[] => {
    const evaluator = publishedEvaluatorOf(row.quantity);
    const name = `${row.id} (${row.quantity}) ${JSON.stringify(row.inputs)}`;
    if (evaluator === undefined) return [{ kind: 'unanswered', row: name }];
    const outcome = outcomeOf(`${name}: printed ${row.value_text}`, () => {
      const found = evaluator.compute(row.inputs, row.quantity);
      if (!row.agrees) return { ...against(found, row.recomputed), found: String(found) };
      return { ...against(found, row.recomputed), within: asPrinted(found, row), found: String(found) };
    });
    if (row.agrees || outcome.kind !== 'met') return [outcome];
    return [{ kind: 'disputed', row: name, reason: reasonOf(row) }];
  });
}

const sharpest = 1e-12;

function against(found: number, recomputed: string | undefined): { readonly error: number; readonly within: boolean } {
  const error = recomputed === undefined ? 0 : relativeError(found, Number(recomputed));
  return { error, within: error <= sharpest };
}

/** Half a unit of the last printed digit, or the last two bits of a double where more digits are printed. */
function asPrinted(found: number, row: Published): boolean {
  const printed = Number(row.value_text);
  const unit = 10 ** -row.decimals;
  const bits = 2 * Number.EPSILON * Math.abs(printed);
  switch (row.rounding) {
    case 'exact':
      return found === printed;
    case 'nearest':
      return Math.abs(found - printed) <= unit / 2 + bits;
    case 'up':
      return found <= printed + bits && found > printed - unit - bits;
  }
}

function reasonOf(row: Published): string {
  return `printed ${row.value_text}, recomputed ${row.recomputed ?? 'not'}${row.note === undefined ? '' : `: ${row.note}`}`;
}
