import type * as v from 'valibot';
import { countSchema, positiveCountSchema, shareSchema, sizeSchema, sourceSchema } from './figure-schemas.ts';
import { choice, isMapping, record } from './schema-parts.ts';

const knownError = record({ sensitivity: shareSchema, 'false-reject': shareSchema, source: sourceSchema });
const triedError = record({ seeded: positiveCountSchema, caught: countSchema, good: positiveCountSchema, 'rejected-good': countSchema });

/** How a station errs: known figures with their source, or a trial on units known beforehand. */
export const stationErrorSchema = choice(
  [knownError, triedError],
  (value) => (isMapping(value) && ('sensitivity' in value || 'false-reject' in value || 'source' in value) ? knownError : triedError),
  'how the station errs: sensitivity, false-reject and source; or of a trial: seeded, caught, good and rejected-good',
);

const designEffect = record({ 'design-effect': sizeSchema, source: sourceSchema });
const events = record({ 'merge-within': positiveCountSchema, 'cluster-size': sizeSchema, source: sourceSchema });

/** What is declared of nonconforming units that come in clusters. */
export const clustersSchema = choice(
  [designEffect, events],
  (value) => (isMapping(value) && 'design-effect' in value ? designEffect : events),
  'a remedy for clusters: design-effect and source; or merge-within (units), cluster-size and source',
);

export type StationErrorFile = v.InferOutput<typeof stationErrorSchema>;
export type ClustersFile = v.InferOutput<typeof clustersSchema>;
