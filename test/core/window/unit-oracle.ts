import { joinedRanges, type RecordRange } from '../../../core/window/record-identity.ts';

export interface OracleUnit {
  readonly source: number;
  readonly sequence: number;
  /** Place in its record, 0 to of - 1, and the record's units. */
  readonly place: number;
  readonly of: number;
  readonly nonconforming: boolean;
}

/** The units of one record: the nonconforming ones stand last. */
export function unitsOf(source: number, sequence: number, of: number, nonconforming: number): OracleUnit[] {
  return Array.from({ length: of }, (_, place) => ({ source, sequence, place, of, nonconforming: place >= of - nonconforming }));
}

/** A window kept as a plain list of units, counted afresh at every question. */
export class UnitOracle {
  units: OracleUnit[] = [];
  rolled = false;
  floors = new Map<number, number>();
  readonly #size: number;

  constructor(size: number) {
    this.#size = size;
  }

  admit(units: readonly OracleUnit[]): void {
    this.units.push(...units);
    this.#trim();
  }

  late(units: readonly OracleUnit[]): OracleUnit[] {
    const { source, sequence } = units[0]!;
    if (sequence <= (this.floors.get(source) ?? 0)) return [];
    const lower = this.units.findLastIndex((unit) => unit.source === source && unit.sequence < sequence);
    if (lower < 0 && this.rolled) return [];
    this.units.splice(lower + 1, 0, ...units);
    this.#trim();
    return this.units.filter((unit) => units.includes(unit));
  }

  correct(source: number, sequence: number, nonconforming: number, inspected?: number): { before: number; after: number } | 'not here' {
    const of = (unit: OracleUnit): boolean => unit.source === source && unit.sequence === sequence;
    const first = this.units.findIndex(of);
    if (first < 0) return 'not here';
    const old = this.units.filter(of);
    const left = old[0]!.place;
    const now = unitsOf(source, sequence, inspected ?? old[0]!.of, nonconforming).slice(left);
    this.units.splice(first, old.length, ...now);
    this.#trim();
    const bad = (units: readonly OracleUnit[]): number => units.filter((unit) => unit.nonconforming).length;
    return { before: bad(old), after: bad(this.units.filter(of)) };
  }

  clear(floors: ReadonlyMap<number, number>): void {
    this.units = [];
    this.rolled = false;
    this.floors = new Map(floors);
  }

  get nonconforming(): number {
    return this.units.filter((unit) => unit.nonconforming).length;
  }

  /** Newest first. */
  strip(): { ago: number; record: { source: number; sequence: number } }[] {
    return this.units
      .map((unit, place) => ({ unit, ago: this.units.length - 1 - place }))
      .filter(({ unit }) => unit.nonconforming)
      .map(({ unit, ago }) => ({ ago, record: { source: unit.source, sequence: unit.sequence } }))
      .reverse();
  }

  ranges(): RecordRange[] {
    const seen = new Set<string>();
    const records = this.units.filter(({ source, sequence }) => !seen.has(`${source} ${sequence}`) && seen.add(`${source} ${sequence}`));
    return joinedRanges(records.map(({ source, sequence }) => ({ source, first: sequence, last: sequence })));
  }

  #trim(): void {
    while (this.units.length > this.#size) {
      this.units.shift();
      this.rolled = true;
    }
  }
}
