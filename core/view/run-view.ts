import type { RunCause } from '../run/run-cause.ts';

/** The evidence of a guarantee's run, since it began at a declared event; it may be looked at at any moment. */
export interface RunView {
  /** 1 for the first; each further one began at a declared event. */
  readonly number: number;
  readonly cause: RunCause;
  /** Of a restart who and why, of a lot or changeover which. */
  readonly detail: string;
  /** ms; undefined before its first record. */
  readonly begunAt: number | undefined;
  /** What it decides: the state, the violation alone, or nothing (it stands beside the window). */
  readonly decides: 'state' | 'violation' | 'nothing';
  /** log10 of the evidence that the guarantee is kept, and that it is broken; undefined where nothing can be said. */
  readonly kept: number | undefined;
  readonly broken: number | undefined;
  /** log10 of the evidence that is enough for either. */
  readonly enoughKept: number;
  readonly enoughBroken: number;
  /** At all looks, in the scale's unit. */
  readonly bound: number | undefined;
  readonly opposite: number | undefined;
  readonly figures: Readonly<Record<string, number>>;
  /** When it first said so, ms: that stays said. */
  readonly keptAt: number | undefined;
  readonly brokenAt: number | undefined;
  readonly method: { readonly name: string; readonly sentence: string; readonly assumes: readonly string[]; readonly source: string };
}

/** GET /api/guarantees/:id/run: where evidence and gauge stood, columns of one length each, oldest first. */
export interface RunPaths {
  readonly guarantee: string;
  readonly run: { readonly at: readonly number[]; readonly kept: readonly number[]; readonly broken: readonly number[] };
  readonly gauge: { readonly at: readonly number[]; readonly gauge: readonly number[] };
}
