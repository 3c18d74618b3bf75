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
