import type { LookRule } from '../evidence/evidence-state.ts';
import { levelsOf } from '../evidence/rule-levels.ts';
import type { Watch } from '../monitor/watch.ts';
import { runMethodOf } from '../run/run-method.ts';
import type { RunPaths, RunView } from './run-view.ts';

const decides = { 'one look': 'nothing', 'all looks': 'state', both: 'violation' } as const;

/** undefined where no evidence at all looks is known for the quantity, or for what the sheet declares. */
export function runViewOf({ guarantee, run }: Watch): RunView | undefined {
  const method = runMethodOf(guarantee);
  const { evidence } = run;
  if (evidence === undefined || method === undefined) return undefined;
  const { bound, opposite } = evidence.bounds();
  return {
    number: run.number,
    cause: run.cause,
    detail: run.detail,
    begunAt: run.begunAt === 0 ? undefined : run.begunAt,
    decides: decides[guarantee.looks],
    kept: tenfold(evidence.lnDemonstrated()),
    broken: tenfold(evidence.lnViolated()),
    enoughKept: -Math.log10(guarantee.tail),
    enoughBroken: -Math.log10(levelsOf(guarantee).violationTail),
    bound,
    opposite,
    figures: evidence.figures(),
    keptAt: run.demonstrated?.at,
    brokenAt: run.violated?.at,
    method: { name: method.name, sentence: method.sentence, assumes: method.assumes, source: method.source },
  };
}

export function runPathsOf({ guarantee, run, change }: Watch): RunPaths {
  const [kept = [], broken = []] = run.path.columns;
  return {
    guarantee: guarantee.id,
    run: { at: run.path.at, kept, broken },
    gauge: { at: change?.path.at ?? [], gauge: change?.path.columns[0] ?? [] },
  };
}

/** By which look rule the bound and the opposite bound that a screen shows hold. */
export function lookRulesOf({ guarantee: { looks }, run }: Watch): { readonly bound: LookRule; readonly opposite: LookRule } {
  if (looks === 'one look' || run.evidence === undefined) return { bound: 'one look', opposite: 'one look' };
  return { bound: looks === 'both' ? 'one look' : 'all looks', opposite: 'all looks' };
}

const tenfold = (ln: number): number | undefined => (Number.isNaN(ln) ? undefined : Math.max(-mostShown, Math.min(mostShown, ln / Math.LN10)));
/** Evidence of a faultless run of 1e9 units is shorter; -Infinity (more found than a lot may hold) is drawn here. */
const mostShown = 1e6;
