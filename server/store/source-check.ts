import { everyStation } from '../ingest/allowed-stations.ts';
import { StoreError } from './store-error.ts';

const word = /^[\p{L}\p{N}._-]{1,64}$/u;

/** @throws StoreError 'bad-source' naming the field, its value and what was expected */
export function checkSource(name: string, stations: readonly string[], products: readonly string[] = []): void {
  checkWord('name', name);
  if (stations.length === 0) throw new StoreError('bad-source', 'stations: none given, expected one station or more.');
  for (const product of products) checkWord('product', product);
  for (const station of stations) if (station !== everyStation) checkWord('station', station);
}

function checkWord(field: string, value: string): void {
  if (!word.test(value)) {
    throw new StoreError('bad-source', `${field}: ${JSON.stringify(value)}, expected 1 to 64 letters, digits and . _ - without spaces.`);
  }
}
