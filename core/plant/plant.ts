import type { CharacteristicId, LineId, ProductId, StationId } from '../record/part.ts';
import type { Guarantee } from './guarantee.ts';

export interface Station {
  readonly id: StationId;
  readonly name: string;
}

export interface Line {
  readonly id: LineId;
  readonly name: string;
  /** In the order the units pass them. */
  readonly stations: readonly Station[];
}

export interface Characteristic {
  readonly id: CharacteristicId;
  readonly name: string;
  /** Unit of measure, for measurements. */
  readonly unit: string | undefined;
}

export interface Product {
  readonly id: ProductId;
  readonly name: string;
  readonly characteristics: readonly Characteristic[];
}

/** A recurring span of the roster in the plant's time zone; `to` at or before `from` means the next day. */
export interface Shift {
  readonly name: string;
  /** ISO weekdays on which it begins, 1 = Monday to 7 = Sunday. */
  readonly days: readonly number[];
  /** Minutes after local midnight, 0 to 1439. */
  readonly fromMinute: number;
  readonly toMinute: number;
}

/** The whole plant file, checked. */
export interface Plant {
  readonly name: string;
  /** IANA time zone name. */
  readonly timeZone: string;
  readonly shifts: readonly Shift[];
  readonly lines: readonly Line[];
  readonly products: readonly Product[];
  readonly guarantees: readonly Guarantee[];
}
