import type { Tail } from '../units.ts';
import { listText, within, type Complain } from './complain.ts';
import { characteristicsNamed, type Directory } from './directory.ts';
import type { Guarantee } from './guarantee.ts';
import type { GuaranteeFile } from './guarantee-schema.ts';
import type { MeasureReader } from './measure-reader.ts';
import { promiseOf } from './promise-of.ts';
import { countedWith, remediesOf } from './remedies-of.ts';
import { rulesOf } from './rules-of.ts';
import { windowOf } from './window-of.ts';

const usualTail = 0.05 as Tail;
const looks = { one: 'one look', all: 'all looks', both: 'both' } as const;

/** Turns one guarantee of the file into the form the rest works with; undefined where a complaint stands in the way. */
export function guaranteeOf(file: GuaranteeFile, directory: Directory, shared: number | undefined, complain: Complain): Guarantee | undefined {
  const stations = file.quantity === 'chained-yield' ? file.stations : [file.station];
  const characteristics = file.quantity === 'chained-yield' ? file.characteristics : [file.characteristic];
  const line = lineOf(file, stations, directory, complain);
  checkCharacteristics(file, stations, characteristics, directory, complain);
  const reading = promiseOf(file, measureReaderFor(file, directory, complain), complain);
  const tail = file.confidence ?? usualTail;
  const remedies = remediesOf(file, tail, complain);
  const asCounted = reading?.counted && countedWith(remedies, reading.counted, tail);
  const window = reading && windowOf(file.window, { ...reading, counted: asCounted?.counted }, asCounted?.tail ?? tail, complain);
  if (reading === undefined || window === undefined) return undefined;
  const { promise, normalRate } = reading;
  const safetyRelevant = file['safety-relevant'] ?? false;
  const setting = { promise, tail, window, counted: asCounted, normalRate, safetyRelevant, shared, remedies };
  const rules = rulesOf(file.alarms ?? {}, setting, within(complain, ['alarms']));
  checkLooks(file, complain);
  const { id, name = id, product } = file;
  const look = looks[file.looks ?? 'one'];
  return { id, name, line, stations, product, characteristics, promise, tail, window, looks: look, normalRate, safetyRelevant, ...remedies, rules };
}

/** Where no bound at all looks is known: a chain of stations, the normal model, and declared inspection errors and clusters. */
function checkLooks(file: GuaranteeFile, complain: Complain): void {
  if (file.looks === undefined || file.looks === 'one') return;
  const why = 'no bound at all looks is known for';
  if (file.quantity === 'chained-yield') complain(['looks'], `one: ${why} a chained yield`);
  if (file.quantity === 'fraction-beyond-limit' && file.model === 'normal') complain(['looks'], `one, or model: counted; ${why} the normal model`);
  if ('clusters' in file && file.clusters !== undefined) complain(['looks'], `one: ${why} declared clusters`);
  if ('inspection-error' in file && file['inspection-error'] !== undefined) complain(['looks'], `one: ${why} a declared inspection error`);
}

/** The line the stations stand on; complains of unknown stations and of a chain that leaves its line or its order. */
function lineOf(file: GuaranteeFile, stations: readonly string[], { stations: known }: Directory, complain: Complain): string {
  if (known === undefined) return '';
  const chained = file.quantity === 'chained-yield';
  const ids = [...known.keys()];
  for (const [at, station] of stations.entries()) {
    const path = chained ? ['stations', at] : ['station'];
    if (!known.has(station)) complain(path, `the id of a station: ${listText(ids)}`, ids);
  }
  const places = stations.map((station) => known.get(station)).filter((place) => place !== undefined);
  for (const [at, place] of places.entries()) {
    const before = places[at - 1];
    if (before !== undefined && (before.line !== place.line || before.at >= place.at)) {
      complain(['stations', at], 'stations of one line, in the order the units pass them');
    }
  }
  return places[0]?.line ?? '';
}

function checkCharacteristics(
  file: GuaranteeFile,
  stations: readonly string[],
  characteristics: readonly string[],
  directory: Directory,
  complain: Complain,
): void {
  if (characteristics.length !== stations.length) complain(['characteristics'], 'one characteristic for each station');
  if (directory.products === undefined) return;
  const { product } = file;
  const products = [...directory.products.values()];
  if (product !== undefined && !directory.products.has(product)) {
    const ids = products.map(({ id }) => id);
    complain(['product'], `the id of a product: ${listText(ids)}`, ids);
    return;
  }
  const asked = product === undefined ? products : products.filter(({ id }) => id === product);
  const ids = [...new Set(asked.flatMap((one) => one.characteristics.map(({ id }) => id)))];
  for (const [at, characteristic] of characteristics.entries()) {
    const path = file.quantity === 'chained-yield' ? ['characteristics', at] : ['characteristic'];
    if (!ids.includes(characteristic)) complain(path, `a characteristic of ${product ?? 'a product'}: ${listText(ids)}`, ids);
  }
}

function measureReaderFor(file: GuaranteeFile, directory: Directory, complain: Complain): MeasureReader {
  const measured = file.quantity === 'mean' || file.quantity === 'fraction-beyond-limit';
  const found = measured ? characteristicsNamed(file.characteristic, file.product, directory) : [];
  const units = [...new Set(found.map(({ unit }) => unit))];
  const [unit = ''] = units;
  if (measured && found.length > 0 && (unit === '' || units.length > 1)) {
    complain(['characteristic'], 'a characteristic with a unit of measure, the same in every product it stands for');
  }
  return {
    unit,
    read: (measure, path) => {
      if (measure.unit === undefined || found.length === 0 || measure.unit === unit) return measure.value;
      return void complain(path, `a figure in ${unit}, the unit of the characteristic`);
    },
  };
}
