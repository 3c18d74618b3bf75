import type { SimulatedUnits } from '../../core/run-length/run-tally.ts';

/** A mean number of units (or exposure, or measurements), computed or simulated. */
export interface MeanUnits {
  readonly units: number;
  /** of a simulated figure; undefined where it was computed */
  readonly standardError: number | undefined;
  /** 'at least' where only a lower bound is known */
  readonly standing: 'about' | 'at least';
}

/** A figure that takes its time, handed over as it comes nearer; in pieces of exposure where it counts those. */
export interface Simulating {
  readonly steps: Generator<SimulatedUnits, SimulatedUnits, undefined>;
  /** what one step of length is in the plant's unit */
  readonly grain: number;
}

/** An alarm setting under examination. */
export interface AlarmRule {
  /** as a sentence begins: 'Window rule: 16 nonconforming or more among the last 10 000 units' */
  readonly sentence: string;
  /** how it says sizes and rates (or means) */
  readonly said: { readonly unit: string; readonly level: string; readonly rate: (rate: number) => string; readonly assumes: string };
  /** mean units between false calls at a rate (or mean) at which the line is well */
  readonly betweenCalls: (rate: number) => MeanUnits | Simulating;
  /** mean units from a change at any moment to the call, once the line has long run at its normal rate (or mean) */
  readonly delay: (normal: number, rate: number) => MeanUnits | Simulating;
  readonly notes: readonly (readonly [string, string])[];
  readonly json: Readonly<Record<string, unknown>>;
}
