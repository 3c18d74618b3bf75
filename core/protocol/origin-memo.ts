import { checkedId } from '../record/checked-words.ts';
import type { Origin } from '../record/part.ts';

/** Origins remembered of one connection; more than a source of one station ever uses. */
const remembered = 32;

/**
 * The origins one connection has named, so that a repeated one is neither checked nor made again:
 * equal origins of one connection are the same object.
 */
export class OriginMemo {
  readonly #origins: Origin[] = [];
  #last: Origin | undefined;
  #oldest = 0;

  /** Refuses ids that are none; `lot` may be undefined. */
  of(station: unknown, product: unknown, characteristic: unknown, lot: unknown): Origin {
    const last = this.#last;
    if (last !== undefined && same(last, station, product, characteristic, lot)) return last;
    const origin = this.#origins.find((known) => same(known, station, product, characteristic, lot)) ?? this.#add(station, product, characteristic, lot);
    this.#last = origin;
    return origin;
  }

  #add(station: unknown, product: unknown, characteristic: unknown, lot: unknown): Origin {
    const origin: Origin = {
      station: checkedId(station, 'station'),
      product: checkedId(product, 'product'),
      characteristic: checkedId(characteristic, 'characteristic'),
      lot: lot === undefined ? undefined : checkedId(lot, 'lot'),
    };
    this.#origins[this.#oldest] = origin;
    this.#oldest = (this.#oldest + 1) % remembered;
    return origin;
  }
}

function same(origin: Origin, station: unknown, product: unknown, characteristic: unknown, lot: unknown): boolean {
  return origin.station === station && origin.product === product && origin.characteristic === characteristic && origin.lot === lot;
}
