import type { Complain } from './complain.ts';
import type { Characteristic, Line, Product } from './plant.ts';

/** Where a station stands: its line and its place in it, from 0. */
export interface StationPlace {
  readonly line: string;
  readonly at: number;
}

/** What guarantees refer to; a part is undefined where the file's own part is faulty and so cannot be relied on. */
export interface Directory {
  readonly stations: ReadonlyMap<string, StationPlace> | undefined;
  readonly products: ReadonlyMap<string, Product> | undefined;
}

/** Stations by id; complains of ids that stand twice: records name stations alone, so they are unique in the plant. */
export function stationsById(lines: readonly Line[], complain: Complain): ReadonlyMap<string, StationPlace> {
  const found = new Map<string, StationPlace>();
  uniqueIds(lines, (at) => complain(['lines', at, 'id'], 'an id that no other line has'));
  for (const [lineAt, line] of lines.entries()) {
    for (const [at, { id }] of line.stations.entries()) {
      if (found.has(id)) complain(['lines', lineAt, 'stations', at, 'id'], 'an id that no other station of the plant has');
      else found.set(id, { line: line.id, at });
    }
  }
  return found;
}

/** Products by id; complains of product ids, and of characteristic ids within a product, that stand twice. */
export function productsById(products: readonly Product[], complain: Complain): ReadonlyMap<string, Product> {
  uniqueIds(products, (at) => complain(['products', at, 'id'], 'an id that no other product has'));
  for (const [productAt, { characteristics }] of products.entries()) {
    uniqueIds(characteristics, (at) =>
      complain(['products', productAt, 'characteristics', at, 'id'], 'an id that no other characteristic of the product has'));
  }
  return new Map(products.map((product) => [product.id, product]));
}

/** Characteristics of that id: of one product, or of all where none is named. */
export function characteristicsNamed(id: string, product: string | undefined, directory: Directory): readonly Characteristic[] {
  const products = directory.products ?? new Map<string, Product>();
  const asked = product === undefined ? [...products.values()] : [products.get(product)];
  return asked.flatMap((one) => one?.characteristics.filter((characteristic) => characteristic.id === id) ?? []);
}

/** Calls back with the place of each entry whose id stood before. */
export function uniqueIds(entries: readonly { readonly id: string }[], repeated: (at: number) => void): void {
  const seen = new Set<string>();
  for (const [at, { id }] of entries.entries()) {
    if (seen.has(id)) repeated(at);
    seen.add(id);
  }
}
