import { checkedSequence } from '../record/checked-words.ts';
import { parsedJson } from '../record/json-text.ts';
import type { Frame, Part } from '../record/part.ts';
import { refuse, settled, under, type Refusal } from '../record/refusal.ts';
import type { Result } from '../result.ts';
import { expectFields, objectAt } from './json-object.ts';
import { partOfJson } from './json-part.ts';
import type { SourceLimits } from './limits.ts';
import { OriginMemo } from './origin-memo.ts';

const frameFields = ['type', 'first', 'parts'];

/** Reads the JSON frames of one connection: one reader a connection, because it remembers the origins named there. */
export class JsonFrameReader {
  readonly #limits: SourceLimits;
  readonly #origins = new OriginMemo();

  constructor(limits: SourceLimits) {
    this.#limits = limits;
  }

  /** The frame a text message holds, or why it is none; never throws. */
  read(text: string): Result<Frame, Refusal> {
    return settled(() => this.#frame(text));
  }

  #frame(text: string): Frame {
    // A text has at least as many bytes as UTF-16 units: what is refused here is too large for certain.
    if (text.length > this.#limits.frameBytes) refuse('frame-too-large', '', text.length, `at most ${this.#limits.frameBytes} bytes`);
    const json = objectAt(parsedJson(text, 'one JSON object'), '', 'an object {"type": "records", "first", "parts"}');
    if (json.type !== 'records') refuse('not-a-frame', 'type', json.type, '"records"');
    expectFields(json, 3, frameFields);
    const first = checkedSequence(json.first, 'first');
    if (!Array.isArray(json.parts)) return refuse('wrong-type', 'parts', json.parts, 'an array of parts');
    const list: readonly unknown[] = json.parts;
    if (list.length === 0) refuse('empty-frame', 'parts', list, 'at least one part');
    if (list.length > this.#limits.parts) refuse('too-many-parts', 'parts', list, `at most ${this.#limits.parts} parts`);
    return this.#numbered(first, list);
  }

  #numbered(first: number, list: readonly unknown[]): Frame {
    const parts: Part[] = [];
    let next = first;
    let most = this.#limits.records;
    for (let i = 0; i < list.length; i += 1) {
      const part = this.#part(list[i], i, next, most);
      next += part.records;
      if (part.kind !== 'lost') most -= part.records;
      parts.push(part);
    }
    checkedSequence(next, 'first');
    return { first, records: next - first, parts };
  }

  #part(item: unknown, index: number, sequence: number, most: number): Part {
    try {
      const part = partOfJson(objectAt(item, '', 'an object with a "kind"'), this.#origins, sequence, most);
      return part.kind === 'lost' || part.records <= most ? part : refuse('too-many-records', '', part.records, `at most ${most} records more in this frame`);
    } catch (cause) {
      throw under(`parts[${index}]`, cause);
    }
  }
}
