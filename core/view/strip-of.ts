import type { Watch } from '../monitor/watch.ts';
import type { Strip } from './history.ts';

/** Nonconforming units listed at most; older ones are only counted. */
const mostListed = 5_000;

/** The units of a guarantee's present window with every nonconforming one; empty where it has no single units. */
export function stripOf(watch: Watch): Strip {
  const { guarantee, evidence, around } = watch;
  const strip = evidence.strip?.(mostListed);
  if (!strip) return { guarantee: guarantee.id, units: 0, full: undefined, nonconforming: [], left: 0 };
  const nonconforming = strip.nonconforming.map(({ ago, record }) => ({
    place: strip.units - 1 - ago,
    at: undefined,
    source: record ? around.sourceName(record.source) : '',
    sequence: record?.sequence ?? 0,
  }));
  return { guarantee: guarantee.id, units: strip.units, full: strip.full, nonconforming: nonconforming.reverse(), left: strip.count - strip.nonconforming.length };
}
