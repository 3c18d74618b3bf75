import type { VectorEvaluator } from './evaluator.ts';

/** Test vectors of the looks at all times: e-processes, detectors, run lengths. */
export const sequentialVectors: readonly VectorEvaluator[] = [];
