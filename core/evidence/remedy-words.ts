import { shareText } from '../describe/share-text.ts';
import type { Clusters, StationError } from '../plant/guarantee.ts';

/** What is declared of a station's errors, in a sentence. */
export function errorWords(error: StationError): string {
  if (error.kind === 'known') {
    return `Declared: ${shareText(error.sensitivity)} of nonconforming units are rejected, and ${shareText(error.falseReject)} of conforming ones (${error.source}).`;
  }
  const { seeded, caught, good, rejectedGood } = error;
  return `Declared from a trial: ${caught} of ${seeded} units known not to conform were rejected, and ${rejectedGood} of ${good} known to conform.`;
}

/** What is declared of clusters, in a sentence. */
export function clusterWords(clusters: Clusters): string {
  if (clusters.kind === 'lots') return `Declared: a lot with more than ${clusters.allowed} nonconforming units does not conform; the promise is about lots.`;
  if (clusters.kind === 'design-effect') return `Declared: a design effect of ${clusters.designEffect} (${clusters.source}).`;
  return `Declared: nonconforming units within ${clusters.gap} units are one event, of ${clusters.clusterSize} units in the mean (${clusters.source}).`;
}
