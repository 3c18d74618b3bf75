import type { Plant } from '../plant/plant.ts';
import { routesFor, routesOf, type Routes as PlantRoutes } from '../plant/routes.ts';
import type { Origin } from '../record/part.ts';
import type { BadDataLog } from './bad-data-log.ts';
import type { StreamActivity } from './silence-watch.ts';
import type { Watch } from './watch.ts';

/** Where the records of an origin go that the plant file knows. */
export interface KnownRoute {
  readonly kind: 'known';
  readonly activity: StreamActivity;
  readonly badData: BadDataLog;
  readonly line: string;
  readonly watches: readonly { readonly watch: Watch; readonly station: number }[];
}

export type Route = KnownRoute | { readonly kind: 'unknown-station' } | { readonly kind: 'unknown-product'; readonly badData: BadDataLog };

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
  readonly #routes: PlantRoutes;
  readonly #known = new WeakMap<Origin, Route>();

  constructor(plant: Plant, watches: readonly Watch[], streams: Streams) {
    this.#streams = streams;
    this.#watches = watches;
    this.#routes = routesOf(plant);
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

  #find(origin: Origin): Route {
    const { station, product, characteristic } = origin;
    const line = this.#lineOf.get(station);
    if (line === undefined) return { kind: 'unknown-station' };
    const badData = this.#streams.badData(station);
    if (!this.#characteristics.get(product)?.has(characteristic)) return { kind: 'unknown-product', badData };
    const watches = routesFor(this.#routes, origin).map((route) => ({ watch: this.#watches[route.guarantee] as Watch, station: route.station }));
    return { kind: 'known', activity: this.#streams.activity(station, characteristic), badData, line, watches };
  }
}
