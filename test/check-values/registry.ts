import { attributeVectors } from './attribute-vectors.ts';
import { attributeGrids, attributePublished } from './attribute.ts';
import type { GridEvaluator, PublishedEvaluator, VectorEvaluator } from './evaluator.ts';
import { measurementGrids, measurementPublished } from './measurements.ts';
import { sequentialVectors } from './sequential.ts';

const grids = [...attributeGrids, ...measurementGrids];
const published = [...attributePublished, ...measurementPublished];
const vectors = [...attributeVectors, ...sequentialVectors];

export function gridEvaluatorOf(quantity: string): GridEvaluator | undefined {
  return grids.find((evaluator) => evaluator.quantity === quantity);
}

export function publishedEvaluatorOf(quantity: string): PublishedEvaluator | undefined {
  return published.find(({ quantity: known }) =>
    typeof known === 'string' ? known === quantity : known.test(quantity));
}

export function vectorEvaluatorOf(fn: string): VectorEvaluator | undefined {
  return vectors.find((evaluator) => evaluator.fn === fn);
}
