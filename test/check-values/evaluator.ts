/** The fields of one row by name; numbers may stand as text where a double would lose digits. */
export type Inputs = Readonly<Record<string, unknown>>;

/** What a row's answer can be: one figure, several in order, or several by name. */
export type Answer = number | readonly number[] | Readonly<Record<string, number>>;

/** Answers the rows of a grid whose `quantity` is this text; the answer is compared with column `answer`. */
export interface GridEvaluator {
  readonly quantity: string;
  readonly answer: string;
  /** whole-number answers must be met exactly, the others to 1e-12 relative */
  readonly exact: boolean;
  readonly compute: (row: Inputs) => number;
}

/** Answers published rows; the figure comes in the unit that was printed (percent, say). */
export interface PublishedEvaluator {
  readonly quantity: string | RegExp;
  readonly compute: (inputs: Inputs, quantity: string) => number;
}

/** Answers test vectors by the name of their function. */
export interface VectorEvaluator {
  readonly fn: string;
  /** largest relative error; 1e-12 unless the figure itself is computed less finely */
  readonly tolerance?: number;
  readonly compute: (inputs: Inputs) => Answer;
}

/** Answers a data set: mean, standard deviation (n - 1) and the one-sided t bounds on the mean. */
export interface DataSetEvaluator {
  readonly mean: (data: readonly number[]) => number;
  readonly deviation: (data: readonly number[]) => number;
  readonly bound: (data: readonly number[], side: 'lower' | 'upper', confidence: string) => number;
}
