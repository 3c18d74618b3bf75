import type { DataSetEvaluator, GridEvaluator, PublishedEvaluator } from './evaluator.ts';

/** Rows about measurements: t and normal quantiles, capability, tolerance factors, fraction beyond a limit. */
export const measurementGrids: readonly GridEvaluator[] = [];

export const measurementPublished: readonly PublishedEvaluator[] = [];

/** Absent until a running mean answers it. */
export const dataSetEvaluator: DataSetEvaluator | undefined = undefined;
