import type { Picture } from '../view/history.ts';
import type { Margin } from '../view/guarantee-view.ts';
import type { Assessment } from './assessment.ts';
import type { Bounds } from './evidence.ts';
import type { HeldRecords } from './held-records.ts';
import type { ModelCheck } from './model-check.ts';

/** Everything that turns what a window of records adds up to into a judgement, bounds and words, for one guarantee. */
export interface RecordRule<S> {
  assess(sum: S, ripe: boolean, waiting: boolean): Assessment;
  /** Why the figures cannot be judged; the state is unknown then. */
  doubt(sum: S): string | undefined;
  figures(sum: S): Readonly<Record<string, number>>;
  bounds(sum: S): Bounds;
  margin(held: HeldRecords<S>): Margin;
  warnings(sum: S): readonly string[];
  picture?(held: HeldRecords<S>): Picture;
  /** Looks at the values themselves now and then, where the rule rests on a model of them. */
  readonly check?: ModelCheck;
}
