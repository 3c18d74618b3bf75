import { refusalTable } from '../../core/protocol/refusals.ts';
import type { Frame, Origin, Part } from '../../core/record/part.ts';
import type { RowRecord } from '../../core/record/row.ts';
import type { Refusal } from '../../core/record/refusal.ts';

/** In a source's list of stations: every station of the plant. */
export const everyStation = '*';

/** Checks that a source sends only for the stations its token names; remembers origins it has seen allowed. */
export class AllowedStations {
  readonly #stations: ReadonlySet<string>;
  readonly #seen = new WeakSet<Origin>();

  constructor(stations: readonly string[]) {
    this.#stations = new Set(stations);
  }

  /** @returns why the frame is refused; undefined if all its stations are allowed */
  refusalOf(frame: Frame): Refusal | undefined {
    if (this.#stations.has(everyStation)) return undefined;
    for (const [index, part] of frame.parts.entries()) {
      const station = this.#foreign(part);
      if (station !== undefined) return this.#refusal(`parts[${index}].station`, station);
    }
    return undefined;
  }

  /** The same for a row. */
  refusalOfRow(row: RowRecord): Refusal | undefined {
    if (this.#stations.has(everyStation)) return undefined;
    const station = row.says === 'finding' ? (this.#stations.has(row.origin.station) ? undefined : row.origin.station) : this.#foreign(row.part);
    return station === undefined ? undefined : this.#refusal('station', station);
  }

  /** Marks of a line name no station: any source of the plant may tell them. */
  #foreign(part: Part): string | undefined {
    if (part.kind === 'lost') return this.#stations.has(part.station) ? undefined : part.station;
    if (!('origin' in part) || this.#seen.has(part.origin)) return undefined;
    if (!this.#stations.has(part.origin.station)) return part.origin.station;
    this.#seen.add(part.origin);
    return undefined;
  }

  #refusal(field: string, value: string): Refusal {
    const expected = [...this.#stations].slice(0, 5).join(', ');
    return { code: 'station-not-allowed', field, value, expected, sentence: refusalTable['station-not-allowed'].sentence };
  }
}
