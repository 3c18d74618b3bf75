import type { Plant } from '../plant/plant.ts';
import type { Origin } from '../record/part.ts';
import type { BadDataLog } from './bad-data-log.ts';
import type { StreamActivity } from './silence-watch.ts';
import type { Watch } from './watch.ts';

/** Where the records of one origin go. */
export type Route =
  | {
      readonly kind: 'known';
      readonly activity: StreamActivity;
      readonly badData: BadDataLog;
      readonly line: string;
      readonly watches: readonly { readonly watch: Watch; readonly station: number }[];
    }
  | { readonly kind: 'unknown-station' }
  | { readonly kind: 'unknown-product'; readonly badData: BadDataLog };

/** What is known by station and by stream of one monitor. */
export interface Streams {
  activity(station: string, characteristic: string): StreamActivity;
  badData(station: string): BadDataLog;
}

/** Finds the watches of an origin; remembers the answer by the origin's object, which readers of frames use again. */
export class Routes {
  readonly #streams: Streams;
  readonly #watches: readonly Watch[];
  readonly #lineOf = new Map<string, string>();
  readonly #characteristics = new Map<string, ReadonlySet<string>>();
  readonly #known = new WeakMap<Origin, Route>();

  constructor(plant: Plant, watches: readonly Watch[], streams: Streams) {
    this.#streams = streams;
    this.#watches = watches;
    for (const line of plant.lines) for (const station of line.stations) this.#lineOf.set(station.id, line.id);
    for (const product of plant.products) this.#characteristics.set(product.id, new Set(product.characteristics.map(({ id }) => id)));
  }

  of(origin: Origin): Route {
    const known = this.#known.get(origin);
    if (known) return known;
    const found = this.#find(origin);
    this.#known.set(origin, found);
    return found;
  }

  lineOfStation(station: string): string | undefined {
    return this.#lineOf.get(station);
  }

  #find({ station, product, characteristic }: Origin): Route {
    const line = this.#lineOf.get(station);
    if (line === undefined) return { kind: 'unknown-station' };
    const badData = this.#streams.badData(station);
    if (!this.#characteristics.get(product)?.has(characteristic)) return { kind: 'unknown-product', badData };
    const watches = this.#watches.flatMap((watch) => {
      const { guarantee } = watch;
      const place = guarantee.stations.findIndex((id, index) => id === station && guarantee.characteristics[index] === characteristic);
      return place >= 0 && (guarantee.product === undefined || guarantee.product === product) ? [{ watch, station: place }] : [];
    });
    return { kind: 'known', activity: this.#streams.activity(station, characteristic), badData, line, watches };
  }
}
