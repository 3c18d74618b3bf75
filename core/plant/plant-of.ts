import { sharesOfBudget } from './budget-shares.ts';
import { within, type Complain } from './complain.ts';
import { productsById, stationsById, uniqueIds, type Directory } from './directory.ts';
import type { FieldPath } from './field-path.ts';
import type { Guarantee } from './guarantee.ts';
import { guaranteeOf } from './guarantee-of.ts';
import type { PlantFile, ShiftFile } from './plant-schema.ts';
import type { Line, Plant, Product, Shift } from './plant.ts';
import { weekdayOf } from './roster-text.ts';
import { checkShifts } from './shift-overlaps.ts';

/** Tells whether the form of a part of the file was without complaint. */
export type Soundness = (part: FieldPath) => boolean;

const everyDay = [1, 2, 3, 4, 5, 6, 7];

/**
 * Puts the parts of a checked file together and compares them with each other.
 *
 * @param sound whether the form of a part was without complaint; parts that are not are left out
 * @returns what could be made of it; whole if nothing was complained of
 */
export function plantOf(file: PlantFile, sound: Soundness, complain: Complain): Plant {
  const lines = sound(['lines']) ? file.lines.map(lineOf) : undefined;
  const products = sound(['products']) ? file.products.map(productOf) : undefined;
  const shifts = sound(['shifts']) ? (file.shifts ?? []).map(shiftOf) : [];
  const directory: Directory = {
    stations: lines && stationsById(lines, complain),
    products: products && productsById(products, complain),
  };
  checkShifts(shifts, complain);
  const guarantees = soundGuarantees(file, sound, directory, complain);
  const { name, timeZone } = sound(['plant']) ? { name: file.plant.name, timeZone: file.plant['time-zone'] } : { name: '', timeZone: 'UTC' };
  return { name, timeZone, shifts, lines: lines ?? [], products: products ?? [], guarantees };
}

function soundGuarantees(
  file: PlantFile,
  sound: Soundness,
  directory: Directory,
  complain: Complain,
): readonly Guarantee[] {
  const list: readonly unknown[] = Array.isArray(file.guarantees) ? file.guarantees : [];
  const entries = list.flatMap((_, at) => (sound(['guarantees', at]) ? [{ at, entry: file.guarantees[at] }] : []));
  const known = entries.flatMap(({ at, entry }) => (entry === undefined ? [] : [{ at, entry, id: entry.id }]));
  uniqueIds(known, (place) => {
    const at = known[place]?.at;
    if (at !== undefined) complain(['guarantees', at, 'id'], 'an id that no other guarantee has');
  });
  const budget = sound(['plant']) ? file.plant['false-calls-per-shift'] : undefined;
  const shares = budget === undefined ? undefined : sharesOfBudget(budget, known, complain);
  return known
    .map(({ at, entry }) => guaranteeOf(entry, directory, shares?.get(at), within(complain, ['guarantees', at])))
    .filter((guarantee) => guarantee !== undefined);
}

function lineOf({ id, name = id, stations }: PlantFile['lines'][number]): Line {
  return { id, name, stations: stations.map((station) => ({ id: station.id, name: station.name ?? station.id })) };
}

function productOf({ id, name = id, characteristics }: PlantFile['products'][number]): Product {
  return { id, name, characteristics: characteristics.map((one) => ({ id: one.id, name: one.name ?? one.id, unit: one.unit })) };
}

function shiftOf({ name, days, from, to }: ShiftFile): Shift {
  const begun = days?.flatMap((day) => (typeof day === 'number' ? [day] : (weekdayOf(day) ?? [])));
  return { name, days: begun ?? everyDay, fromMinute: from, toMinute: to };
}
