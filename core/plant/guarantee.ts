import type { CharacteristicId, LineId, ProductId, StationId } from '../record/part.ts';
import type { Fraction, SpanMs, Tail } from '../units.ts';

/** Which units a bound is computed from. */
export type WindowRule =
  /** The last `units` units (for rates: the last `units` records), 1 to 1e9. */
  | { readonly kind: 'units'; readonly units: number }
  /** The last `spanMs` of time, moved on in steps of `stepMs` (a divisor of the span), by time of inspection. */
  | { readonly kind: 'time'; readonly spanMs: SpanMs; readonly stepMs: SpanMs }
  | { readonly kind: 'lot' }
  | { readonly kind: 'shift' }
  /** Since evidence was restarted (at a declared event, by a named person, with a reason). */
  | { readonly kind: 'run' };

/** What was promised. Lines are in the quantity's own unit; `target` is where allowance used is 0 %. */
export type Promised =
  | { readonly quantity: 'nonconforming-fraction'; readonly atMost: Fraction; readonly target: Fraction }
  | { readonly quantity: 'yield'; readonly atLeast: Fraction; readonly target: Fraction; /** Exact decimal complement of atLeast. */ readonly atMostNonconforming: Fraction }
  | {
      readonly quantity: 'rate';
      /** Nonconformities per `per` of `unit`, e.g. 2 per 100 m. */
      readonly atMost: number;
      readonly per: number;
      readonly unit: string;
      readonly target: number;
    }
  | {
      readonly quantity: 'mean';
      readonly side: 'at-least' | 'at-most';
      readonly line: number;
      readonly target: number;
      readonly unit: string;
      /** Known standard deviation with where it is known from; the t bound without it. */
      readonly sigma: { readonly value: number; readonly source: string } | undefined;
      /** Smallest and largest value the measurement can take: asks for the bound without a distribution. */
      readonly range: { readonly from: number; readonly to: number } | undefined;
    }
  | {
      readonly quantity: 'fraction-beyond-limit';
      readonly atMost: Fraction;
      readonly target: Fraction;
      readonly limit: { readonly side: 'below' | 'above'; readonly value: number };
      readonly unit: string;
      readonly model: 'counted' | 'normal';
    }
  | { readonly quantity: 'chained-yield'; readonly atLeast: Fraction; readonly target: Fraction }
  | { readonly quantity: 'lot-fraction'; readonly atMost: Fraction; readonly target: Fraction };

export type Quantity = Promised['quantity'];

/** Alarm priorities, most urgent first (IEC 62682 asks for a small set). */
export type Priority = 'high' | 'medium' | 'low';

interface RuleBase {
  readonly priority: Priority;
  /** What a person is to do, in the plant's words; may be empty. */
  readonly response: string;
}

/** When a raised alarm of a bound returns to normal: the bound back by a distance, or demonstrated for some units. */
export interface ReturnRule {
  /** Share of the way from target to line the bound must be back by, 0 to 0.9; 0 asks for none. */
  readonly distance: number;
  /** Units in a row that must have been demonstrated, 0 or more; 0 asks for none. */
  readonly units: number;
}

export type AlarmRule =
  | (RuleBase & { readonly kind: 'crossing'; readonly return: ReturnRule })
  | (RuleBase & { readonly kind: 'violation'; /** Tail of the opposite bound, or of the run's evidence against the line where it decides. */ readonly tail: Tail; readonly return: ReturnRule })
  | (RuleBase & {
      readonly kind: 'deterioration';
      /** Units (exposure for a rate, values for a mean) that pass on average between two false calls, at least. */
      readonly unitsBetweenFalseCalls: number;
      readonly baseline: 'line' | 'normal-rate';
      readonly detector: 'mixture' | 'cusum';
    })
  | (RuleBase & { readonly kind: 'silence'; readonly afterMs: SpanMs })
  | (RuleBase & { readonly kind: 'bad-data'; readonly moreThan: number; readonly withinMs: SpanMs });

export type RuleKind = AlarmRule['kind'];

/** How the station errs, for which the bound is corrected: known from outside, or tried on units known beforehand. */
export type StationError =
  | {
      readonly kind: 'known';
      /** Chance that it rejects a nonconforming unit, above falseReject, at most 1. */
      readonly sensitivity: Fraction;
      /** Chance that it rejects a conforming unit, 0 or more. */
      readonly falseReject: Fraction;
      readonly source: string;
    }
  | {
      readonly kind: 'tried';
      /** Units known not to conform, and of these rejected; whole. */
      readonly seeded: number;
      readonly caught: number;
      /** Units known to conform, and of these rejected; whole. */
      readonly good: number;
      readonly rejectedGood: number;
    };

/** What is declared in advance of nonconforming units that do not come singly. */
export type Clusters =
  /** The sample counts as one 1 / designEffect its size; 1 or more. */
  | { readonly kind: 'design-effect'; readonly designEffect: number; readonly source: string }
  /** Nonconforming units at most `gap` units after the one before are one event; an event has `clusterSize` units in the mean. */
  | { readonly kind: 'events'; readonly gap: number; readonly clusterSize: number; readonly source: string }
  /** Whole lots are counted: one with more than `allowed` nonconforming units does not conform; the promise is about lots. */
  | { readonly kind: 'lots'; readonly allowed: number };

/** One promise with its settings: what a limit sheet says. */
export interface Guarantee {
  readonly id: string;
  readonly name: string;
  readonly line: LineId;
  /** Stations that give the evidence, in line order; one, but for a chained yield (two or more). */
  readonly stations: readonly StationId[];
  /** undefined: every product inspected there. */
  readonly product: ProductId | undefined;
  /** Characteristic by station, same order as `stations`. */
  readonly characteristics: readonly CharacteristicId[];
  readonly promise: Promised;
  /** Tail of the bound that is compared with the line; its complement is the confidence level. */
  readonly tail: Tail;
  readonly window: WindowRule;
  /**
   * What decides the state: the window's bound at one look, the run's evidence at all looks, or the window for the
   * demonstration and the run for the violation.
   */
  readonly looks: 'one look' | 'all looks' | 'both';
  /** Declared rate of the well line, same unit as the line; never guessed from the data it judges. */
  readonly normalRate: number | undefined;
  readonly safetyRelevant: boolean;
  /** Of fractions of units and yields. */
  readonly stationError?: StationError | undefined;
  readonly clusters?: Clusters | undefined;
  readonly rules: readonly AlarmRule[];
}
