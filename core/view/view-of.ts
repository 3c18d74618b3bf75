import { allowanceUsed } from '../evidence/allowance.ts';
import type { Watch } from '../monitor/watch.ts';
import { guaranteeLineOf } from '../plant/guarantee-line.ts';
import type { GuaranteeView } from './guarantee-view.ts';

/** What screens show of a guarantee now; computes its bounds. */
export function viewOf(watch: Watch): GuaranteeView {
  const { guarantee, standing, evidence, around } = watch;
  const { line, target } = guaranteeLineOf(guarantee.promise);
  const { estimate, bound, opposite } = evidence.bounds();
  const used = allowanceUsed(bound, line, target);
  return {
    id: guarantee.id,
    state: standing.state,
    remark: standing.remark ?? elsewhere(watch),
    since: standing.since,
    lookRule: 'one look',
    estimate,
    bound,
    oppositeBound: opposite,
    allowance: {
      estimate: allowanceUsed(estimate, line, target),
      bound: used,
      opposite: allowanceUsed(opposite, line, target),
      trail: watch.trail.tips,
    },
    figures: evidence.figures(),
    margin: evidence.margin(),
    newest: watch.newest === 0 ? undefined : watch.newest,
    detector: watch.change?.view(),
    drift: watch.trail.drift(used),
    product: around.line.product,
    lot: around.line.lot,
    alarmIds: around.desk.standingOf(guarantee.id).map(({ id }) => id),
    lineRunning: around.line.running,
    warnings: watch.lost.none ? evidence.warnings() : [...evidence.warnings(), `${watch.lost.records} records of this window were lost.`],
  };
}

/** Another product runs now: the figures stand still, and nobody should wonder why. */
function elsewhere({ guarantee, around }: Watch): string | undefined {
  const running = around.line.product;
  if (guarantee.product === undefined || running === undefined || running === guarantee.product) return undefined;
  return `${running} runs on the line now; this is how ${guarantee.product} stood last.`;
}
