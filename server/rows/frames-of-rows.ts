import { RowsToFrames } from '../../core/record/rows-to-frames.ts';
import type { Frame } from '../../core/record/part.ts';
import type { Refusal } from '../../core/record/refusal.ts';
import type { RowRecord } from '../../core/record/row.ts';
import type { RowForm } from './row-form.ts';
import { RowReader, type RowOnLine } from './row-reader.ts';

export interface RowsSetting {
  /** undefined: told by the text's first character. */
  readonly form: RowForm | undefined;
  /** Most bytes of a row, records and parts of a frame. */
  readonly rowBytes: number;
  readonly records: number;
  readonly parts: number;
  /** Asked once, with the first row: the sequence it gets if it states none. */
  readonly begin: (row: RowRecord) => number | Promise<number>;
  /** Why a row is not to be taken, as far as that is known before it is sent. */
  readonly refusalOf?: (row: RowRecord, line: number) => Refusal | undefined;
  /** Rows do not wait longer than this for others to fill their frame, ms. */
  readonly idleMs: number;
}

/** What comes of rows: frames, with the line of their first row; at last perhaps the refusal that ended the reading. */
export type RowsOutcome =
  | { readonly kind: 'frame'; readonly frame: Frame; readonly line: number }
  | { readonly kind: 'refused'; readonly refusal: Refusal };

/** Gathers the rows of a text into frames while it comes. Holds one frame and one piece of the text at most. */
export async function* framesOfRows(text: AsyncIterator<Uint8Array>, setting: RowsSetting): AsyncGenerator<RowsOutcome, void, undefined> {
  const reader = new RowReader(setting.form, setting.rowBytes);
  const gathering = new Gathering(setting);
  let coming = next(text);
  for (;;) {
    const piece = gathering.isEmpty ? await coming : await firstOf(coming, setting.idleMs);
    if (piece === 'idle') {
      yield* gathering.flush();
      continue;
    }
    const { rows, refusal } = piece.done === true ? reader.end() : reader.read(piece.value);
    for (const row of rows) {
      if (!gathering.begun) await gathering.begin(row);
      const made = gathering.take(row);
      yield* made;
      if (made.at(-1)?.kind === 'refused') return;
    }
    if (refusal !== undefined || piece.done === true) {
      yield* gathering.flush();
      if (refusal !== undefined) yield { kind: 'refused', refusal };
      return;
    }
    coming = next(text);
  }
}

function next(text: AsyncIterator<Uint8Array>): Promise<IteratorResult<Uint8Array>> {
  const coming = text.next();
  coming.catch(() => undefined); // Told where it is awaited; should nobody do so any more, it concerns nobody.
  return coming;
}

async function firstOf<T>(coming: Promise<T>, idleMs: number): Promise<T | 'idle'> {
  let timer: NodeJS.Timeout | undefined;
  const idle = new Promise<'idle'>((resolve) => {
    timer = setTimeout(() => resolve('idle'), idleMs);
  });
  try {
    return await Promise.race([coming, idle]);
  } finally {
    clearTimeout(timer);
  }
}

const nothing: readonly RowsOutcome[] = [];

/** The frame in the making. */
class Gathering {
  readonly #setting: RowsSetting;
  #frames: RowsToFrames | undefined;
  /** Line of the first row gathered; 0 when there is none. */
  #line = 0;

  constructor(setting: RowsSetting) {
    this.#setting = setting;
  }

  get begun(): boolean {
    return this.#frames !== undefined;
  }

  get isEmpty(): boolean {
    return this.#line === 0;
  }

  async begin({ row }: RowOnLine): Promise<void> {
    const { records, parts, begin } = this.#setting;
    this.#frames = new RowsToFrames({ first: await begin(row), records, parts });
  }

  /** The frame that the row completed, if it did, and what is refused of it. */
  take({ row, line }: RowOnLine): readonly RowsOutcome[] {
    const refusal = this.#setting.refusalOf?.(row, line);
    if (refusal !== undefined) return [...this.flush(), { kind: 'refused', refusal }];
    const added = this.#frames?.add(row, line);
    if (added === undefined) return nothing;
    if (!added.ok) return [...this.flush(), { kind: 'refused', refusal: added.fault }];
    const begins = this.#line === 0 ? line : this.#line;
    this.#line = added.value === undefined ? begins : line;
    return added.value === undefined ? nothing : [{ kind: 'frame', frame: added.value, line: begins }];
  }

  flush(): readonly RowsOutcome[] {
    const frame = this.#frames?.flush();
    const line = this.#line;
    this.#line = 0;
    return frame === undefined ? nothing : [{ kind: 'frame', frame, line }];
  }
}
