import { allowanceUsed } from '../evidence/allowance.ts';
import { decidingBounds, decidingFigures, decidingMargin } from '../monitor/decision.ts';
import type { Watch } from '../monitor/watch.ts';
import { guaranteeLineOf } from '../plant/guarantee-line.ts';
import { saysClusters } from '../evidence/cluster-warnings.ts';
import type { GuaranteeView } from './guarantee-view.ts';
import { lookRulesOf, runViewOf } from './run-view-of.ts';

/** What screens show of a guarantee now; computes its bounds. */
export function viewOf(watch: Watch): GuaranteeView {
  const { guarantee, standing, evidence, around } = watch;
  const { line, target } = guaranteeLineOf(guarantee.promise);
  const { estimate, bound, opposite } = decidingBounds(watch);
  const warnings = evidence.warnings();
  const looks = lookRulesOf(watch);
  const used = allowanceUsed(bound, line, target);
  return {
    id: guarantee.id,
    state: standing.state,
    remark: standing.remark ?? elsewhere(watch),
    since: standing.since,
    lookRule: looks.bound,
    oppositeLookRule: looks.opposite,
    estimate,
    bound,
    oppositeBound: opposite,
    allowance: {
      estimate: allowanceUsed(estimate, line, target),
      bound: used,
      opposite: allowanceUsed(opposite, line, target),
      trail: watch.trail.tips,
    },
    figures: decidingFigures(watch),
    margin: decidingMargin(watch),
    newest: watch.newest === 0 ? undefined : watch.newest,
    detector: watch.change?.view(warnings.some(saysClusters)),
    run: runViewOf(watch),
    drift: watch.trail.drift(used),
    product: around.line.product,
    lot: around.line.lot,
    alarmIds: around.desk.standingOf(guarantee.id).map(({ id }) => id),
    lineRunning: around.line.running,
    warnings: watch.lost.none ? warnings : [...warnings, `${watch.lost.records} records of this window were lost.`],
  };
}

/** Another product runs now: the figures stand still, and nobody should wonder why. */
function elsewhere({ guarantee, around }: Watch): string | undefined {
  const running = around.line.product;
  if (guarantee.product === undefined || running === undefined || running === guarantee.product) return undefined;
  return `${running} runs on the line now; this is how ${guarantee.product} stood last.`;
}
