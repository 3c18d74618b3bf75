import { isAlias, isMap, isScalar, isSeq, type Node } from 'yaml';
import { fault, ok, type Result } from '../result.ts';
import { fieldText, type FieldPath } from './field-path.ts';
import { plantFaultOf, type Complaint, type Place, type PlantFault } from './plant-fault.ts';

/** Plain values of a plant file, with the place of each. */
export interface PlantTree {
  readonly value: unknown;
  /** Place of a value, or of its field's name; the nearest parent's where the path leads nowhere. */
  placeOf(path: FieldPath, part: 'value' | 'name'): Place;
}

/** Most values in a file once aliases are written out: stops a small file from growing into a huge one. */
export const mostValues = 250_000;

const deepest = 32;
/** Names with a meaning of their own in the language: as fields they would be lost without a word. */
const reserved: ReadonlySet<string> = new Set(['__proto__', 'constructor', 'prototype']);

/** Turns a parsed document into plain values; duplicate names, unknown aliases and odd names are faults. */
export function plantTreeOf(
  contents: Node,
  placeAt: (offset: number) => Place,
): Result<PlantTree, readonly PlantFault[]> {
  const walk = new Walk();
  const value = walk.valueOf(contents, [], 0);
  const placeOf: PlantTree['placeOf'] = (path, part) => {
    for (let length = path.length; length >= 0; length -= 1) {
      const found = walk.offsets.get(fieldText(path.slice(0, length)));
      if (found !== undefined) return placeAt(found[part]);
    }
    return placeAt(0);
  };
  const { complaints } = walk;
  if (complaints.length === 0) return ok({ value, placeOf });
  return fault(complaints.map((complaint) => plantFaultOf(complaint, placeOf(complaint.path, 'name'))));
}

class Walk {
  readonly complaints: Complaint[] = [];
  readonly offsets = new Map<string, { readonly name: number; readonly value: number }>();
  readonly #anchors = new Map<string, Node>();
  #values = 0;
  #aliasesOpen = 0;

  valueOf(node: Node | null, path: FieldPath, nameAt: number): unknown {
    const valueAt = node?.range?.[0] ?? nameAt;
    const name = this.#aliasesOpen === 0 && (path.length === 0 || typeof path.at(-1) === 'number') ? valueAt : nameAt;
    this.offsets.set(fieldText(path), { name, value: isScalar(node) && this.#aliasesOpen === 0 ? valueAt : name });
    this.#values += 1;
    if (this.#values > mostValues) return this.#refuseOnce(path, `at most ${mostValues} values once aliases are written out`);
    if (path.length > deepest) return this.#refuseOnce(path, 'aliases that do not contain themselves');
    if (isAlias(node)) return this.#aliased(node.source, path, name);
    if (node?.anchor !== undefined && this.#aliasesOpen === 0) this.#anchors.set(node.anchor, node);
    if (isSeq<Node>(node)) return node.items.map((item, at) => this.valueOf(item, [...path, at], name));
    if (isMap<Node, Node | null>(node)) return this.#mapping(node.items, path, name);
    const plain = isScalar(node) ? node.value : null;
    return plain !== null && typeof plain === 'object'
      ? this.#complain(path, undefined, 'text, a number, true or false: no other type of value')
      : plain;
  }

  #aliased(source: string, path: FieldPath, name: number): unknown {
    const target = this.#anchors.get(source);
    if (target === undefined) return this.#complain(path, `*${source}`, 'an alias whose anchor stands further up');
    this.#aliasesOpen += 1;
    const value = this.valueOf(target, path, name);
    this.#aliasesOpen -= 1;
    return value;
  }

  #mapping(pairs: readonly { key: Node; value: Node | null }[], path: FieldPath, nameAt: number): unknown {
    const fields = Object.create(null) as Record<string, unknown>;
    for (const { key, value } of pairs) {
      const name = isScalar(key) ? key.value : undefined;
      const at = this.#aliasesOpen === 0 ? (key.range?.[0] ?? nameAt) : nameAt;
      if (typeof name !== 'string' || reserved.has(name)) {
        this.#complain(path, name, 'field names that are plain words');
      } else if (name in fields) {
        this.offsets.set(fieldText([...path, name]), { name: at, value: at });
        this.#complain([...path, name], name, 'each field once; it stands here a second time');
      } else {
        fields[name] = this.valueOf(value, [...path, name], at);
      }
    }
    return fields;
  }

  #refuseOnce(path: FieldPath, expected: string): undefined {
    if (this.complaints.at(-1)?.expected !== expected) this.#complain(path, undefined, expected);
  }

  #complain(path: FieldPath, found: unknown, expected: string): undefined {
    this.complaints.push({ path, found, expected, about: 'value', known: [] });
  }
}
