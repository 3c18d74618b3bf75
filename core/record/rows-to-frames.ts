import type { Result } from '../result.ts';
import { checkedCorrection } from './checked-part.ts';
import { checkedSequence } from './checked-words.ts';
import { frameOf } from './frame-of.ts';
import { GrowingPart } from './growing-part.ts';
import type { Frame, Part } from './part.ts';
import { settled, type Refusal } from './refusal.ts';
import type { RowRecord } from './row.ts';

export interface GatherRules {
  /** Sequence of the first row when it states none; 1 or more. */
  readonly first: number;
  /** Most records of a frame, 1 or more; at most the server's limit. */
  readonly records: number;
  /** Most parts of a frame, 1 or more; at most the server's limit. */
  readonly parts: number;
}

/**
 * Gathers rows into frames as they stream by: neighbours of one origin and kind become one part, and a frame
 * ends where it is full or where the sequence does not go on. Holds one frame's rows at most.
 */
export class RowsToFrames {
  readonly #rules: GatherRules;
  #next: number;
  #first = 0;
  #records = 0;
  #parts: Part[] = [];
  #growing: GrowingPart | undefined;

  constructor(rules: GatherRules) {
    this.#rules = rules;
    this.#next = rules.first;
  }

  /** The sequence a row without one would get now. */
  get next(): number {
    return this.#next;
  }

  /**
   * Takes one row in.
   *
   * @param line 1-based, for the refusal
   * @returns the frame that this row completed (the row itself begins the next one), or undefined
   */
  add(row: RowRecord, line: number): Result<Frame | undefined, Refusal> {
    return settled(() => {
      const sequence = row.sequence ?? this.#next;
      const records = row.says === 'finding' ? 1 : row.part.records;
      checkedSequence(sequence + records - 1, 'sequence');
      if (row.says === 'part' && row.part.kind === 'correction') checkedCorrection(row.part, sequence);
      const done = sequence === this.#next && this.#hasRoomFor(row) ? undefined : this.flush();
      if (this.#isEmpty()) this.#first = sequence;
      this.#take(row);
      this.#next = sequence + records;
      return done;
    }, line);
  }

  /** The frame gathered so far, undefined when there is none; the next row begins a new one. */
  flush(): Frame | undefined {
    if (this.#isEmpty()) return undefined;
    this.#endPart();
    const frame = frameOf(this.#first, this.#parts);
    this.#parts = [];
    this.#records = 0;
    return frame;
  }

  #isEmpty(): boolean {
    return this.#growing === undefined && this.#parts.length === 0;
  }

  #hasRoomFor(row: RowRecord): boolean {
    if (row.says === 'finding' && this.#growing?.takes(row.origin, row.finding) === true) return this.#records < this.#rules.records;
    const parts = this.#parts.length + (this.#growing === undefined ? 0 : 1);
    return parts < this.#rules.parts && (this.#records < this.#rules.records || (row.says === 'part' && row.part.kind === 'lost'));
  }

  #take(row: RowRecord): void {
    if (row.says === 'part') {
      this.#endPart();
      this.#parts.push(row.part);
      if (row.part.kind !== 'lost') this.#records += 1;
      return;
    }
    if (this.#growing?.takes(row.origin, row.finding) !== true) {
      this.#endPart();
      this.#growing = new GrowingPart(row.origin, row.finding.kind);
    }
    this.#growing?.add(row.at, row.finding);
    this.#records += 1;
  }

  #endPart(): void {
    if (this.#growing !== undefined) this.#parts.push(this.#growing.part());
    this.#growing = undefined;
  }
}
