import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { EvidenceState } from '../../../core/evidence/evidence-state.ts';
import { clockMoment } from '../../../core/evidence/moment.ts';
import { decidingBounds } from '../../../core/monitor/decision.ts';
import { Monitor } from '../../../core/monitor/monitor.ts';
import type { Watch } from '../../../core/monitor/watch.ts';
import { guaranteeLineOf } from '../../../core/plant/guarantee-line.ts';
import { everyGuarantee, feed, partsOf, pieces, plantOfText, recipes } from './evidence-plant.ts';

const plant = plantOfText(everyGuarantee());

/** Which states the bounds allow, computed apart from the record path. */
function allowedBy(watch: Watch): readonly EvidenceState[] {
  const { line, side } = guaranteeLineOf(watch.guarantee.promise);
  const { bound, opposite } = decidingBounds(watch);
  const { looks } = watch.guarantee;
  // A run has a bound of one side where it has none of the other: before that it says nothing about its line.
  if (looks === 'one look' && (bound === undefined || opposite === undefined)) return ['gathering', 'unknown'];
  const good = bound !== undefined && (side === 'at-most' ? bound <= line : bound >= line);
  const bad = opposite !== undefined && (side === 'at-most' ? opposite > line : opposite < line);
  // Bets against the line decide for values between two ends; their bound needs no line, and is wider.
  if (looks !== 'one look' && watch.guarantee.id.startsWith('range')) return ['demonstrated', 'undecided', 'violated', 'gathering', 'unknown'];
  if (looks !== 'one look' && good && bad) return ['violated', 'unknown'];
  if (good) return ['demonstrated', 'gathering', 'unknown'];
  return bad ? ['violated', 'undecided', 'gathering', 'unknown'] : ['undecided', 'gathering', 'unknown'];
}

describe('the state of every evidence', () => {
  it('[E5] is what its bounds say, at random positions', () => {
    let compared = 0;
    fc.assert(
      fc.property(recipes, fc.integer({ min: 1, max: 25 }), (list, most) => {
        const monitor = new Monitor(plant, 'v');
        let next = 1;
        for (const part of pieces(partsOf(list), most)) {
          next = feed(monitor, [part], 1, next).next;
          for (const watch of monitor.watches) {
            // A chain tells a demonstration up to 63 units late; asked to weigh, it tells it now.
            if (watch.guarantee.id.startsWith('chain') && watch.standing.state !== 'demonstrated') watch.evidence.weigh(clockMoment(monitor.now));
            expect([watch.guarantee.id, allowedBy(watch)]).toEqual([watch.guarantee.id, expect.arrayContaining([watch.standing.state])]);
            compared += ['demonstrated', 'undecided', 'violated'].includes(watch.standing.state) ? 1 : 0;
          }
        }
      }),
      { seed: 4201, numRuns: 40 },
    );
    expect(compared).toBeGreaterThan(5_000);
  });

  it('is violated where a ripe window has its opposite bound beyond the line, gathering only where the bound cannot be good', () => {
    fc.assert(
      fc.property(recipes, (list) => {
        const monitor = new Monitor(plant, 'v');
        feed(monitor, partsOf(list), 1);
        for (const watch of monitor.watches) {
          const { id } = watch.guarantee;
          const { window, promise } = watch.guarantee;
          const { inspected, records, values, windowUnits, windowRecords } = watch.evidence.figures();
          const held = inspected ?? records ?? values;
          const ripe = window.kind === 'run' || (window.kind === 'units' && held !== undefined && held === (windowUnits ?? windowRecords));
          const allowed = allowedBy(watch);
          const { state } = watch.standing;
          if (ripe && allowed[0] === 'violated' && state !== 'unknown' && state !== 'gathering') expect([id, state]).toEqual([id, 'violated']);
          if (promise.quantity === 'mean' || promise.quantity === 'fraction-beyond-limit') continue;
          if (state === 'gathering') expect([id, allowed[0]]).not.toEqual([id, 'demonstrated']);
        }
      }),
      { seed: 4202, numRuns: 60 },
    );
  });
});
