import * as v from 'valibot';
import { fault, ok, type Result } from '../result.ts';
import type { Complain } from './complain.ts';
import type { FieldPath } from './field-path.ts';
import { complaintOfIssue } from './issue-complaint.ts';
import { plantFaultOf, type Complaint, type PlantFault } from './plant-fault.ts';
import { plantOf, type Soundness } from './plant-of.ts';
import { plantSchema, type PlantFile } from './plant-schema.ts';
import { plantTreeOfText } from './plant-text.ts';
import type { PlantTree } from './plant-tree.ts';
import type { Plant } from './plant.ts';

/** A plant file that passed every check, with the version (a content hash) its reader gave it. */
export interface PlantReading {
  readonly plant: Plant;
  readonly version: string;
}

/** Most faults that are told of one file; the last then says how many more there are. */
const mostFaults = 200;

/**
 * Reads a whole plant file (YAML 1.2 or JSON) and checks everything in it at once: its form, then what its parts say
 * of each other. A faulty part does not keep the sound ones from being checked.
 *
 * @param text    the file, at most 4 MiB in UTF-8
 * @param version content hash of the file, made by the caller; carried along unchanged
 * @returns the plant, or every fault found, in file order
 */
export function readPlant(text: string, version: string): Result<PlantReading, readonly PlantFault[]> {
  const tree = plantTreeOfText(text);
  if (!tree.ok) return fault(inOrder(tree.fault));
  const checked = v.safeParse(plantSchema, tree.value.value);
  const complaints = (checked.issues ?? []).map(complaintOfIssue);
  const complain: Complain = (path, expected, known = []) => {
    const found = valueAt(tree.value.value, path);
    complaints.push({ path, found, expected, about: found === undefined ? 'missing' : 'value', known });
  };
  const sound = soundnessOf(complaints);
  // What a faulty part left in the output is not of the stated type: plantOf asks before it looks at a part.
  const plant = sound([]) ? plantOf(checked.output as PlantFile, sound, complain) : undefined;
  return plant === undefined || complaints.length > 0 ? fault(faultsOf(complaints, tree.value)) : ok({ plant, version });
}

function soundnessOf(complaints: readonly Complaint[]): Soundness {
  const faulty = new Set<string>();
  for (const { path } of complaints) {
    if (path.length === 0) faulty.add('');
    for (let length = 1; length <= path.length; length += 1) faulty.add(path.slice(0, length).join('\n'));
  }
  const fixed: ReadonlySet<string> = faulty;
  return (part) => !fixed.has(part.join('\n'));
}

function faultsOf(complaints: readonly Complaint[], tree: PlantTree): readonly PlantFault[] {
  return inOrder(complaints.map((complaint) =>
    plantFaultOf(complaint, tree.placeOf(complaint.path, complaint.about === 'value' ? 'value' : 'name'))));
}

function inOrder(faults: readonly PlantFault[]): readonly PlantFault[] {
  const sorted = [...faults].sort((a, b) => a.line - b.line || a.column - b.column);
  const first = sorted.slice(0, mostFaults);
  const last = first.at(-1);
  if (last === undefined || sorted.length === first.length) return first;
  const sentence = `The file has ${sorted.length - mostFaults} faults more; mend these first.`;
  return [...first, { ...last, field: '', sentence }];
}

function valueAt(tree: unknown, path: FieldPath): unknown {
  let value = tree;
  for (const step of path) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, step)) return undefined;
    value = (value as Readonly<Record<string | number, unknown>>)[step];
  }
  return value;
}
