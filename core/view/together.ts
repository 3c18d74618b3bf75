import { demonstratedTogether } from '../budget/demonstrated-together.ts';
import type { Watch } from '../monitor/watch.ts';
import type { Tail } from '../units.ts';

/** GET /api/guarantees/together: which guarantees are demonstrated, said of all of them together at this moment. */
export interface Together {
  /** Accepted share of wrong ones among those named, on average. */
  readonly tail: number;
  /** Ids, the strongest first. */
  readonly demonstrated: readonly string[];
  /** Guarantees that were asked; each counts, also one of which nothing can be said. */
  readonly among: number;
  /** Ids without evidence at all looks: nothing is said of them, and they do not count. */
  readonly left: readonly string[];
}

/** By the evidence of the runs, as it stands now. @param tail above 0, below 1 @coverage as `demonstratedTogether` */
export function togetherOf(watches: readonly Watch[], tail: Tail): Together {
  const asked = watches.flatMap(({ guarantee, run }) => (run.evidence === undefined ? [] : [{ id: guarantee.id, ln: run.evidence.size > 0 ? run.evidence.lnDemonstrated() : 0 }]));
  return {
    tail,
    demonstrated: demonstratedTogether(asked.map(({ ln }) => ln), tail).flatMap((place) => asked[place]?.id ?? []),
    among: asked.length,
    left: watches.filter(({ run }) => run.evidence === undefined).map(({ guarantee }) => guarantee.id),
  };
}
