import { fieldText, foundText, type FieldPath } from './field-path.ts';
import { suggestionFor } from './suggestion.ts';

/** One thing wrong in a plant file: where, what stands there, what was expected, and a sentence that says it all. */
export interface PlantFault {
  /** Where to look, both counted from 1; for something missing, where its parent begins. */
  readonly line: number;
  readonly column: number;
  /** Path of the field, e.g. guarantees[2].at-most; empty for the file as a whole. */
  readonly field: string;
  /** The value as a person would write it, shortened; 'nothing' for something missing. */
  readonly found: string;
  readonly expected: string;
  readonly sentence: string;
}

/** Something wrong at a path, before it is known where in the text that is. */
export interface Complaint {
  readonly path: FieldPath;
  readonly found: unknown;
  readonly expected: string;
  /** What is wrong: the value, that there is none, or that no such field exists. */
  readonly about: 'value' | 'missing' | 'unknown field';
  /** Words of which one was probably meant. */
  readonly known: readonly string[];
}

export interface Place {
  readonly line: number;
  readonly column: number;
}

export function plantFaultOf(complaint: Complaint, place: Place): PlantFault {
  const field = fieldText(complaint.path);
  const found = complaint.about === 'unknown field' ? String(complaint.path.at(-1)) : complaint.found;
  const text = foundText(found);
  const sentence = `${field === '' ? 'The file' : field} (line ${place.line}): ${clauseOf(complaint, text)}.`;
  return { ...place, field, found: text, expected: complaint.expected, sentence };
}

function clauseOf({ about, expected, known, found, path }: Complaint, text: string): string {
  switch (about) {
    case 'missing':
      return `is missing; expected ${expected}`;
    case 'unknown field':
      return `there is no such field here${meant(path.at(-1), known)}; expected ${expected}`;
    case 'value':
      return `${text} does not fit${meant(found, known)}; expected ${expected}`;
  }
}

function meant(word: unknown, known: readonly string[]): string {
  const near = typeof word === 'string' ? suggestionFor(word, known) : undefined;
  return near === undefined || near === word ? '' : ` (did you mean '${near}'?)`;
}
