import type { Origin } from '../record/part.ts';
import type { Plant } from './plant.ts';

/** A guarantee that takes evidence from some station's characteristic. */
export interface Route {
  /** Place of the guarantee in the plant's list, from 0. */
  readonly guarantee: number;
  /** Which of the guarantee's stations this is, from 0; more than one only in a chained yield. */
  readonly station: number;
  /** The only product it is about; undefined for every product. */
  readonly product: string | undefined;
}

/** Routes by `${station}\n${characteristic}`; in the order of the plant's guarantees. */
export type Routes = ReadonlyMap<string, readonly Route[]>;

const none: readonly Route[] = [];

/** Lists for each station and characteristic which guarantees its records belong to. */
export function routesOf(plant: Plant): Routes {
  const routes = new Map<string, Route[]>();
  for (const [guarantee, { stations, characteristics, product }] of plant.guarantees.entries()) {
    for (const [at, station] of stations.entries()) {
      const key = `${station}\n${characteristics[at] ?? ''}`;
      const known = routes.get(key) ?? [];
      routes.set(key, known);
      known.push({ guarantee, station: at, product });
    }
  }
  return routes;
}

/** The routes that records of one origin take: once a part, not once a record. */
export function routesFor(routes: Routes, { station, characteristic, product }: Origin): readonly Route[] {
  const known = routes.get(`${station}\n${characteristic}`) ?? none;
  return known.every((route) => fits(route, product)) ? known : known.filter((route) => fits(route, product));
}

const fits = (route: Route, product: string): boolean => route.product === undefined || route.product === product;
