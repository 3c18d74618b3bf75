import { errorLines, tellsUnitsApart } from '../bound/station-error-lines.ts';
import type { Fraction, Tail } from '../units.ts';
import type { Complain } from './complain.ts';
import type { Clusters, StationError } from './guarantee.ts';
import type { GuaranteeFile } from './guarantee-schema.ts';
import type { Counted } from './promise-reading.ts';
import type { ClustersFile, StationErrorFile } from './remedy-schemas.ts';

/** What a guarantee declares of its station's errors and of clusters. */
export interface Remedies {
  readonly stationError?: StationError | undefined;
  readonly clusters?: Clusters | undefined;
}

/** Reads the remedies of a guarantee; complains of what cannot be corrected. */
export function remediesOf(file: GuaranteeFile, tail: Tail, complain: Complain): Remedies {
  if (!('clusters' in file || 'inspection-error' in file)) return {};
  const { 'inspection-error': error, clusters } = file;
  if (error !== undefined && clusters !== undefined) {
    complain(['clusters'], 'no clusters beside an inspection-error: no bound is known that corrects for both');
  }
  const stationError = error && stationErrorOf(error, tail, complain);
  return { ...(stationError && { stationError }), ...(clusters && { clusters: clustersOf(clusters, file.window, complain) }) };
}

function stationErrorOf(file: StationErrorFile, tail: Tail, complain: Complain): StationError | undefined {
  const path = ['inspection-error'];
  if ('sensitivity' in file) {
    const { sensitivity, 'false-reject': falseReject, source } = file;
    if (sensitivity.share > falseReject.share) return { kind: 'known', sensitivity: sensitivity.share, falseReject: falseReject.share, source };
    return void complain([...path, 'sensitivity'], 'a share above that of false-reject: a station that rejects good units as readily as bad ones tells nothing');
  }
  const { seeded, caught, good, 'rejected-good': rejectedGood } = file;
  if (caught > seeded) return void complain([...path, 'caught'], `at most ${seeded}, the units that were seeded`);
  if (rejectedGood > good) return void complain([...path, 'rejected-good'], `at most ${good}, the units known to conform`);
  const error: StationError = { kind: 'tried', seeded, caught, good, rejectedGood };
  if (tellsUnitsApart(error, tail)) return error;
  return void complain(path, 'a trial that shows at this confidence level that the station rejects bad units more readily than good ones; try more units');
}

function clustersOf(file: ClustersFile, window: GuaranteeFile['window'], complain: Complain): Clusters {
  if ('lots-with-more-than' in file) {
    if (window !== undefined && window !== 'run' && !(typeof window === 'object' && 'units' in window)) complain(['clusters', 'lots-with-more-than'], 'a window of units, which are whole lots then, or run');
    return { kind: 'lots', allowed: file['lots-with-more-than'] };
  }
  const { source } = file;
  if ('design-effect' in file) return { kind: 'design-effect', designEffect: file['design-effect'], source };
  if (typeof window === 'object' && 'time' in window) {
    complain(['clusters', 'merge-within'], 'a window of units, a lot, shift or run: a window of time does not keep where its units stood; or design-effect instead');
  }
  return { kind: 'events', gap: file['merge-within'], clusterSize: file['cluster-size'], source };
}

/**
 * Lines, target and normal rate as they show in what is counted: rejects instead of nonconforming units, events, or
 * a smaller sample; with the tail that is left for the count. Windows and return distances are settled with these.
 */
export function countedWith({ stationError, clusters }: Remedies, counted: Counted, tail: Tail): { readonly counted: Counted; readonly tail: Tail } {
  if (stationError !== undefined) {
    const { toDemonstrate, tail: left } = errorLines(stationError, tail);
    return { counted: mapped(counted, toDemonstrate), tail: left };
  }
  if (clusters === undefined || clusters.kind === 'lots') return { counted, tail };
  const by = clusters.kind === 'events' ? clusters.clusterSize : clusters.designEffect;
  return { counted: mapped(counted, (line) => line / by), tail };
}

function mapped({ line, target, well }: Counted, map: (line: number) => number): Counted {
  return { line: map(line) as Fraction, target: map(target) as Fraction, well: well === undefined ? undefined : (map(well) as Fraction) };
}

/** How many rejects or events a line stands for where the change detector counts them. */
export function detectorLine({ stationError, clusters }: Remedies, line: number, tail: Tail): number {
  if (stationError !== undefined) return errorLines(stationError, tail).toDetect(line);
  return clusters?.kind === 'events' ? line / clusters.clusterSize : line;
}
