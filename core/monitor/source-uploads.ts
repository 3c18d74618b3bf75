/** Rows without sequences that a source uploaded under a key of its own. */
export interface Upload {
  readonly key: string;
  /** Tells apart what was sent under the same key: made from the first row. */
  readonly mark: string;
  /** Sequence that its first row got. */
  readonly first: number;
  /** Where it ended; while it runs, where it was taken up last. */
  readonly next: number;
}

export interface UploadsSnapshot {
  /** Oldest first. */
  readonly known: readonly Upload[];
  readonly running: string | undefined;
}

/** Keys remembered for a source; the oldest is forgotten beyond that. */
export const mostUploads = 1_000;

/**
 * The uploads of one source, so that one that is sent again finds the sequences it had. While one runs, all records
 * of the source are its own: whoever else sends for the source ends it first.
 */
export class SourceUploads {
  readonly #known = new Map<string, Upload>();
  #running: string | undefined;

  /** Key of the upload that runs. */
  get running(): string | undefined {
    return this.#running;
  }

  of(key: string): Upload | undefined {
    return this.#known.get(key);
  }

  /**
   * An upload begins, or goes on if nothing of the source came since it ended; otherwise it does not run, and only
   * what it sent before is known.
   *
   * @param next sequence the source is to send next
   */
  begin(key: string, mark: string, next: number): void {
    this.end(next);
    const known = this.#known.get(key);
    if (known !== undefined && known.next !== next) return;
    if (known === undefined) this.#known.set(key, { key, mark, first: next, next });
    this.#running = key;
    const [oldest] = this.#known.keys();
    if (this.#known.size > mostUploads && oldest !== undefined) this.#known.delete(oldest);
  }

  /** The running upload ends, whether complete or not. */
  end(next: number): void {
    const upload = this.#running === undefined ? undefined : this.#known.get(this.#running);
    if (upload !== undefined) this.#known.set(upload.key, { ...upload, next });
    this.#running = undefined;
  }

  snapshot(): UploadsSnapshot {
    return { known: [...this.#known.values()], running: this.#running };
  }

  restore({ known, running }: UploadsSnapshot): void {
    this.#known.clear();
    for (const upload of known) this.#known.set(upload.key, upload);
    this.#running = running;
  }
}
