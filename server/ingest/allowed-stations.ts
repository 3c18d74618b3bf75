import { refusalTable } from '../../core/protocol/refusals.ts';
import type { Frame, Origin, Part } from '../../core/record/part.ts';
import type { RowRecord } from '../../core/record/row.ts';
import type { Refusal } from '../../core/record/refusal.ts';

/** In a source's list of stations: every station of the plant. */
export const everyStation = '*';

/** What a source's token names. */
export interface Allowance {
  readonly stations: readonly string[];
  /** Empty or absent: every product. */
  readonly products?: readonly string[];
}

type ForbiddenCode = 'station-not-allowed' | 'product-not-allowed';

/** Something a source may not send for. */
interface Forbidden {
  readonly code: ForbiddenCode;
  readonly field: 'station' | 'product';
  readonly value: string;
}

/** Checks that a source sends only for the stations and products its token names; remembers origins it has seen allowed. */
export class AllowedStations {
  readonly #stations: ReadonlySet<string>;
  readonly #products: ReadonlySet<string>;
  readonly #everything: boolean;
  readonly #seen = new WeakSet<Origin>();

  constructor({ stations, products = [] }: Allowance) {
    this.#stations = new Set(stations);
    this.#products = new Set(products);
    this.#everything = this.#stations.has(everyStation) && this.#products.size === 0;
  }

  /** @returns why the frame is refused; undefined if all it tells of is allowed */
  refusalOf(frame: Frame): Refusal | undefined {
    if (this.#everything) return undefined;
    for (const [index, part] of frame.parts.entries()) {
      const found = this.#foreign(part);
      if (found !== undefined) return this.#refusal(`parts[${index}].${found.field}`, found);
    }
    return undefined;
  }

  /** The same for a row. */
  refusalOfRow(row: RowRecord): Refusal | undefined {
    if (this.#everything) return undefined;
    const found = row.says === 'finding' ? this.#foreignOrigin(row.origin) : this.#foreign(row.part);
    return found && this.#refusal(found.field, found);
  }

  /** Marks of a line name no station: any source of the plant may tell them, of the products it is for. */
  #foreign(part: Part): Forbidden | undefined {
    if (part.kind === 'lost') return this.#foreignStation(part.station);
    if (part.kind === 'changeover' || part.kind === 'lot-start') return this.#foreignProduct(part.product);
    if (!('origin' in part) || this.#seen.has(part.origin)) return undefined;
    const found = this.#foreignOrigin(part.origin);
    if (found === undefined) this.#seen.add(part.origin);
    return found;
  }

  #foreignOrigin({ station, product }: Origin): Forbidden | undefined {
    return this.#foreignStation(station) ?? this.#foreignProduct(product);
  }

  #foreignStation(value: string): Forbidden | undefined {
    return this.#stations.has(value) || this.#stations.has(everyStation) ? undefined : { code: 'station-not-allowed', field: 'station', value };
  }

  #foreignProduct(value: string): Forbidden | undefined {
    return this.#products.size === 0 || this.#products.has(value) ? undefined : { code: 'product-not-allowed', field: 'product', value };
  }

  #refusal(field: string, { code, field: of, value }: Forbidden): Refusal {
    const expected = [...(of === 'station' ? this.#stations : this.#products)].slice(0, 5).join(', ');
    return { code, field, value, expected, sentence: refusalTable[code].sentence };
  }
}
