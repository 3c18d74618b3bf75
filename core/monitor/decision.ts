import { allowanceUsed } from '../evidence/allowance.ts';
import type { Bounds, Evidence } from '../evidence/evidence.ts';
import { guaranteeLineOf } from '../plant/guarantee-line.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { GuaranteeRun } from '../run/guarantee-run.ts';
import type { Margin } from '../view/guarantee-view.ts';

/** A guarantee with both kinds of its evidence. */
export interface Weighed {
  readonly guarantee: Guarantee;
  readonly evidence: Evidence;
  readonly run: GuaranteeRun;
}

/** The bounds that decide the state: those of the window, of the run, or the window's with the run's opposite. */
export function decidingBounds({ guarantee: { looks }, evidence, run }: Weighed): Bounds {
  if (run.evidence === undefined || looks === 'one look') return evidence.bounds();
  return looks === 'all looks' ? run.evidence.bounds() : { ...evidence.bounds(), opposite: run.evidence.bounds().opposite };
}

/** Allowance used by the bound that decides. */
export function decidingTip(weighed: Weighed): number | undefined {
  const { line, target } = guaranteeLineOf(weighed.guarantee.promise);
  return allowanceUsed(decidingBounds(weighed).bound, line, target);
}

/** The figures behind the state. */
export function decidingFigures({ guarantee: { looks }, evidence, run }: Weighed): Readonly<Record<string, number>> {
  const window = evidence.figures();
  if (run.evidence === undefined || looks === 'one look') return window;
  // How far the window is filled says nothing where the run decides.
  const { filled: _filled, ...others } = window;
  return { ...(looks === 'both' ? window : others), ...run.evidence.figures() };
}

/** What a person can count, of the evidence that decides. */
export function decidingMargin({ guarantee: { looks }, evidence, run }: Weighed): Margin {
  return looks === 'all looks' && run.evidence ? run.evidence.margin() : evidence.margin();
}
