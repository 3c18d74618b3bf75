import type { StationCount } from '../../core/bound/chained-yield.ts';
import { OutOfDomain, requireInside } from '../../core/bound/out-of-domain.ts';
import { tailOfConfidence } from '../../core/bound/tail-of.ts';
import type { Tail } from '../../core/units.ts';

/** The fields of one request by name, as they came: nothing is known of their values yet. */
export type Given = Readonly<Record<string, unknown>>;

export type Side = 'lower' | 'upper';

const missing = '(missing)';

function refused(field: string, value: unknown, expected: string): OutOfDomain {
  return new OutOfDomain(field, value === undefined ? missing : JSON.stringify(value), expected);
}

/** @throws OutOfDomain naming the field unless it holds a number; whether it is in range is for the bound to say */
export function numberIn(given: Given, field: string): number {
  const value = given[field];
  if (typeof value === 'number') return value;
  throw refused(field, value, 'a number');
}

/** The same, or undefined where the field is absent. */
export function optionalNumberIn(given: Given, field: string): number | undefined {
  return given[field] === undefined ? undefined : numberIn(given, field);
}

/** @throws OutOfDomain naming the field unless it holds one of the choices, or is absent and there is a preset */
export function choiceIn<const T extends string>(given: Given, field: string, choices: readonly T[], preset?: T): T {
  const value = given[field] ?? preset;
  const found = choices.find((choice) => choice === value);
  if (found !== undefined) return found;
  throw refused(field, value, `one of ${choices.join(', ')}`);
}

export function sideIn(given: Given): Side {
  const { side } = given;
  if (side === 'upper' || side === 'lower') return side;
  throw refused('side', side, 'lower or upper');
}

/** Whether the bound is to hold at one look fixed in advance (the preset) or at all looks of a run. */
export function looksIn(given: Given): 'one' | 'all' {
  const { looks } = given;
  if (looks === undefined || looks === 'one') return 'one';
  if (looks === 'all') return 'all';
  throw refused('looks', looks, 'one or all');
}

/** Tells a tail from its confidence level; the last level is remembered, since a batch mostly asks for one. */
export class TailReader {
  #confidence: unknown;
  #tail = NaN as Tail;

  /** @throws OutOfDomain unless exactly one of `confidence` and `tail` is given, above 0 and below 1 */
  tailIn({ confidence, tail }: Given): Tail {
    if (confidence === undefined) return statedTail(tail);
    if (tail !== undefined) throw refused('tail', tail, 'confidence or tail, not both');
    if (typeof confidence !== 'number' && typeof confidence !== 'string') throw refused('confidence', confidence, 'a decimal number above 0 and below 1');
    if (confidence !== this.#confidence) {
      this.#tail = tailOfConfidence(confidence);
      this.#confidence = confidence;
    }
    return this.#tail;
  }
}

function statedTail(tail: unknown): Tail {
  if (tail === undefined) throw refused('confidence', undefined, 'a decimal number above 0 and below 1 (or its complement as tail)');
  if (typeof tail !== 'number') throw refused('tail', tail, 'a number above 0 and below 1');
  requireInside('tail', tail);
  return tail as Tail;
}

/** @throws OutOfDomain unless `stations` is a list of {station, n, nonconforming} */
export function stationsIn(given: Given): readonly StationCount[] {
  const { stations } = given;
  if (!Array.isArray(stations)) throw refused('stations', stations, 'a list of {"station", "n", "nonconforming"}');
  return stations.map((entry: unknown, at) => {
    if (typeof entry !== 'object' || entry === null) throw refused(`stations[${at}]`, entry, 'an object with station, n and nonconforming');
    const { station = String(at + 1), ...counts } = entry as Given;
    if (typeof station !== 'string') throw refused(`stations[${at}].station`, station, 'a text');
    const unknown = Object.keys(counts).find((key) => key !== 'n' && key !== 'nonconforming');
    if (unknown !== undefined) throw new OutOfDomain(`stations[${at}].${unknown}`, JSON.stringify(counts[unknown]), 'no such field');
    return { station, nonconforming: numberIn(counts, 'nonconforming'), inspected: numberIn(counts, 'n') };
  });
}
