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

const lots = record({ 'lots-with-more-than': countSchema });

/** What is declared of nonconforming units that come in clusters. */
export const clustersSchema = choice(
  [designEffect, events, lots],
  (value) => (!isMapping(value) ? events : 'design-effect' in value ? designEffect : 'lots-with-more-than' in value ? lots : events),
  'a remedy for clusters: design-effect and source; merge-within (units), cluster-size and source; or lots-with-more-than (units)',
);

export type StationErrorFile = v.InferOutput<typeof stationErrorSchema>;
export type ClustersFile = v.InferOutput<typeof clustersSchema>;
