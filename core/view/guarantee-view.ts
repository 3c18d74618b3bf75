import type { EvidenceState, LookRule } from '../evidence/evidence-state.ts';
import type { DetectorView } from '../run/detector-view.ts';
import type { RunView } from './run-view.ts';
import type { Guarantee, Quantity, WindowRule } from '../plant/guarantee.ts';

/** How figures of a guarantee are written: shares of units, a rate per exposure, or a measured value with its unit. */
export type Scale =
  | { readonly kind: 'share' }
  | { readonly kind: 'rate'; readonly per: number; readonly unit: string }
  | { readonly kind: 'measure'; readonly unit: string };

/** What does not change while a plant file is in force. */
export interface GuaranteeCard {
  readonly id: string;
  readonly name: string;
  readonly line: string;
  readonly lineName: string;
  readonly stationNames: readonly string[];
  readonly product: string | undefined;
  readonly productName: string | undefined;
  readonly characteristicName: string;
  readonly quantity: Quantity;
  readonly side: 'at-most' | 'at-least';
  readonly scale: Scale;
  /** The guarantee line and the target, in the scale's unit (shares as fractions). */
  readonly guaranteeLine: number;
  readonly target: number;
  /** Confidence level as a decimal text, e.g. '0.95', and its tail as a number. */
  readonly confidence: string;
  readonly tail: number;
  readonly window: WindowRule;
  /** What decides: the window at one look, the run at all looks, or the window with the run calling the violation. */
  readonly looks: Guarantee['looks'];
  readonly safetyRelevant: boolean;
  readonly specificationLimit: { readonly side: 'below' | 'above'; readonly value: number; readonly unit: string } | undefined;
  readonly method: { readonly name: string; readonly sentence: string; readonly assumes: readonly string[]; readonly source: string };
}

/** A place on the lane, as allowance used: 0 at the target, 1 on the guarantee line; may exceed 1 or be negative. */
export type Allowance = number;

/** What a person can count. Each is absent where it does not apply or cannot be told. */
export interface Margin {
  /** More nonconforming units (or nonconformities) the window can take and stay demonstrated, 0 or more. */
  readonly canTake?: number;
  /** Conforming units in a row until demonstrated (again). */
  readonly conformingToDemonstrate?: number;
  /** Units more until a faultless window could be demonstrated (while gathering). */
  readonly unitsToGather?: number;
  /** For measurements: how far the bound stands on the good side of the line, in the unit of measure. */
  readonly clearance?: number;
}

/** The state of one guarantee now; plain data for screens, made by core. */
export interface GuaranteeView {
  readonly id: string;
  readonly state: EvidenceState;
  /** Why it is unknown, or another remark that belongs beside the state; one sentence. */
  readonly remark: string | undefined;
  /** Since when it is in this state, ms. */
  readonly since: number;
  /** Of the bound, and of the opposite bound. */
  readonly lookRule: LookRule;
  readonly oppositeLookRule: LookRule;
  /** Estimate and bound in the scale's unit; undefined where there is none (no units yet). */
  readonly estimate: number | undefined;
  readonly bound: number | undefined;
  /** The opposite bound, at the level of the violation rule. */
  readonly oppositeBound: number | undefined;
  readonly allowance: {
    readonly estimate: Allowance | undefined;
    readonly bound: Allowance | undefined;
    readonly opposite: Allowance | undefined;
    /** Where the tip stood over the last hour, oldest first, at most 12, equally spaced; NaN-free. */
    readonly trail: readonly Allowance[];
  };
  /** Figures of the window by name: inspected, nonconforming, exposure, count, mean, sd, filled (0 to 1), … */
  readonly figures: Readonly<Record<string, number>>;
  readonly margin: Margin;
  /** Time of inspection of the newest record, ms; undefined before the first. */
  readonly newest: number | undefined;
  /** The change detector, where the plant file asks for one. */
  readonly detector: DetectorView | undefined;
  /** The evidence since the run began, at all looks. */
  readonly run: RunView | undefined;
  /** Which way the bound has gone over the last hour. */
  readonly drift: 'rising' | 'falling' | 'steady' | undefined;
  /** Product and lot at the station now, where told. */
  readonly product: string | undefined;
  readonly lot: string | undefined;
  /** Highest state among its alarms, for the lane's button. */
  readonly alarmIds: readonly number[];
  readonly lineRunning: boolean | undefined;
  /** Warnings that belong beside the bound (skewness, clusters, …). */
  readonly warnings: readonly string[];
}
