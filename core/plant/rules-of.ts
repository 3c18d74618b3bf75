import type { SpanMs, Tail } from '../units.ts';
import type { AlarmsFile } from './alarm-schema.ts';
import type { Complain } from './complain.ts';
import { deteriorationOf } from './deterioration-of.ts';
import type { AlarmRule, Priority, Promised, ReturnRule, WindowRule } from './guarantee.ts';
import type { Counted } from './promise-reading.ts';
import type { Remedies } from './remedies-of.ts';

/** What the defaults of the alarm rules depend on. */
export interface RuleSetting {
  readonly promise: Promised;
  readonly tail: Tail;
  readonly window: WindowRule;
  /** Lines as they show in what is counted, with the tail left for the count. */
  readonly counted: { readonly counted: Counted; readonly tail: Tail } | undefined;
  readonly normalRate: number | undefined;
  readonly safetyRelevant: boolean;
  readonly remedies: Remedies;
  /** Units between false calls that the plant's budget leaves for this guarantee; undefined without a budget. */
  readonly shared: number | undefined;
}

/** Tail of the violation rule where none is given: a line at its guarantee is called ill by a window once in millions of units. */
const violationTail = 0.001;
const usualDistance = 0.1;
const silenceMs = 300_000 as SpanMs;
const badDataMs = 600_000 as SpanMs;
const badDataMost = 10;

/** Something in a rule's file form; a rule that is left out has every default, one that is 'off' is not there. */
type Settings<Rule extends keyof AlarmsFile> = Exclude<NonNullable<AlarmsFile[Rule]>, 'off'>;

/** The alarm rules in force: those of the file with their defaults; complains of settings that could do harm. */
export function rulesOf(file: AlarmsFile, setting: RuleSetting, complain: Complain): readonly AlarmRule[] {
  const safe = setting.safetyRelevant;
  const lost = 'this rule on: for a safety-relevant guarantee lost data counts as trouble';
  if (safe && file.silence === 'off') complain(['silence'], lost);
  if (safe && file['bad-data'] === 'off') complain(['bad-data'], lost);
  const rules: (AlarmRule | undefined)[] = [
    file.crossing === 'off' ? undefined : crossingOf(file.crossing ?? {}, setting, complain),
    file.violation === 'off' ? undefined : violationOf(file.violation ?? {}, setting, complain),
    file.deterioration === 'off' ? undefined : worsening(file.deterioration, setting, complain),
    file.silence === 'off' ? undefined : silenceOf(file.silence ?? {}, safe),
    file['bad-data'] === 'off' ? undefined : badDataOf(file['bad-data'] ?? {}, safe),
  ];
  return rules.filter((rule) => rule !== undefined);
}

function urgencyOf(file: { priority?: Priority | undefined; response?: string | undefined }, usual: Priority): { priority: Priority; response: string } {
  return { priority: file.priority ?? usual, response: file.response ?? '' };
}

function crossingOf(file: Settings<'crossing'>, setting: RuleSetting, complain: Complain): AlarmRule {
  const reach = reachOf(setting);
  const rule = returnOf(file.return, reach, setting.window, (path, expected) => complain(['crossing', ...path], expected));
  return { kind: 'crossing', ...urgencyOf(file, 'medium'), return: rule };
}

function violationOf(file: Settings<'violation'>, setting: RuleSetting, complain: Complain): AlarmRule {
  const tail = file.confidence ?? (Math.min(violationTail, setting.tail) as Tail);
  if (tail > setting.tail) complain(['violation', 'confidence'], 'a confidence level not below that of the guarantee');
  const rule = returnOf(file.return, 1, setting.window, (path, expected) => complain(['violation', ...path], expected));
  return { kind: 'violation', ...urgencyOf(file, 'high'), tail, return: rule };
}

function worsening(file: Settings<'deterioration'> | undefined, setting: RuleSetting, complain: Complain): AlarmRule | undefined {
  const detector = deteriorationOf(file, setting, (path, expected) => complain(['deterioration', ...path], expected));
  return detector && { kind: 'deterioration', ...urgencyOf(file ?? {}, 'medium'), ...detector };
}

function silenceOf(file: Settings<'silence'>, safetyRelevant: boolean): AlarmRule {
  return { kind: 'silence', ...urgencyOf(file, safetyRelevant ? 'high' : 'medium'), afterMs: file.after ?? silenceMs };
}

function badDataOf(file: Settings<'bad-data'>, safetyRelevant: boolean): AlarmRule {
  const { 'more-than': moreThan = badDataMost, within: withinMs = badDataMs } = file;
  return { kind: 'bad-data', ...urgencyOf(file, safetyRelevant ? 'medium' : 'low'), moreThan, withinMs };
}

/**
 * How far back from the line a window in which all units conform brings the bound, as a part of the way to the target.
 * @source own derivation: the exact upper bound at 0 of n is 1 - tail^(1/n)
 */
function reachOf({ counted: asCounted, window }: RuleSetting): number {
  if (asCounted === undefined || window.kind !== 'units') return 1;
  const { counted, tail } = asCounted;
  const faultless = -Math.expm1(Math.log(tail) / window.units);
  return (counted.line - faultless) / (counted.line - counted.target);
}

function returnOf(file: Settings<'crossing'>['return'], reach: number, window: WindowRule, complain: Complain): ReturnRule {
  const reachable = usualDistance <= reach;
  const someUnits = window.kind === 'units' ? Math.ceil(window.units / 20) : 1000;
  if (file?.distance === undefined && file?.units === undefined) {
    return reachable ? { distance: usualDistance, units: 0 } : { distance: 0, units: someUnits };
  }
  const { distance = 0, units = 0 } = file;
  if (distance === 0 && units === 0) complain(['return'], 'a distance or units above 0: without either one unit could make the alarm chatter');
  if (distance > reach) {
    const most = Math.max(0, Math.floor(reach * 100) / 100);
    complain(['return', 'distance'], `at most ${most}: not even a faultless window brings the bound farther back; or units instead`);
  }
  return { distance, units };
}
