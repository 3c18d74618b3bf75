import { checkedId } from '../record/checked-words.ts';
import type { Origin } from '../record/part.ts';

/** Origins remembered of one connection; more than the streams it mixes. Beyond, all are forgotten and learnt anew. */
const remembered = 256;

/**
 * The origins one connection has named, so that a repeated one is neither checked nor made again:
 * equal origins of one connection are the same object while they are remembered.
 */
export class OriginMemo {
  readonly #byStation = new Map<unknown, Origin[]>();
  #count = 0;
  #last: Origin | undefined;

  /** Refuses ids that are none; `lot` may be undefined. */
  of(station: unknown, product: unknown, characteristic: unknown, lot: unknown): Origin {
    const last = this.#last;
    if (last !== undefined && same(last, station, product, characteristic, lot)) return last;
    const known = this.#byStation.get(station)?.find((one) => same(one, station, product, characteristic, lot));
    const origin = known ?? this.#add(station, product, characteristic, lot);
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
    if (this.#count >= remembered) {
      this.#byStation.clear();
      this.#count = 0;
    }
    this.#count += 1;
    const others = this.#byStation.get(origin.station);
    if (others) others.push(origin);
    else this.#byStation.set(origin.station, [origin]);
    return origin;
  }
}

function same(origin: Origin, station: unknown, product: unknown, characteristic: unknown, lot: unknown): boolean {
  return origin.station === station && origin.product === product && origin.characteristic === characteristic && origin.lot === lot;
}
