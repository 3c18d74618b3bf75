import type { Guarantee } from '../plant/guarantee.ts';
import type { Json } from './canonical-json.ts';

type Settings = Readonly<Record<string, Json>>;

/** What changed in the limits of a plant: settings of each guarantee, before and after, only those that differ. */
export interface LimitChanges {
  readonly before: Settings;
  readonly after: Settings;
}

/** @returns both empty where no guarantee changed; null stands for a guarantee or setting that is not there */
export function limitChanges(before: readonly Guarantee[], after: readonly Guarantee[]): LimitChanges {
  const [was, is] = [byId(before), byId(after)];
  const changed = { before: {} as Record<string, Json>, after: {} as Record<string, Json> };
  for (const id of new Set([...was.keys(), ...is.keys()])) {
    const [from, to] = [was.get(id), is.get(id)];
    if (from === undefined || to === undefined) {
      changed.before[id] = from ?? null;
      changed.after[id] = to ?? null;
      continue;
    }
    const names = [...new Set([...Object.keys(from), ...Object.keys(to)])].filter((name) => JSON.stringify(from[name]) !== JSON.stringify(to[name]));
    if (names.length === 0) continue;
    changed.before[id] = pick(from, names);
    changed.after[id] = pick(to, names);
  }
  return changed;
}

/** Settings as JSON keeps them: what is undefined is not there. */
function byId(guarantees: readonly Guarantee[]): ReadonlyMap<string, Settings> {
  return new Map(guarantees.map((guarantee) => [guarantee.id, JSON.parse(JSON.stringify(guarantee)) as Settings]));
}

const pick = (settings: Settings, names: readonly string[]): Settings => Object.fromEntries(names.map((name) => [name, settings[name] ?? null]));
