import { SourceUploads, type UploadsSnapshot } from './source-uploads.ts';

/** Sequences a source declared lost and has not sent since; both ends included. */
export interface Hole {
  readonly first: number;
  readonly last: number;
}

/** Where a frame belongs in the order of its source. */
export type Admission =
  | { readonly kind: 'new' }
  /** Every record is known already: acknowledged again, counted never again. */
  | { readonly kind: 'repeat' }
  /** Fills sequences declared lost before. */
  | { readonly kind: 'late' }
  /** Some of its records belong elsewhere than others: `piecesOf` cuts it. */
  | { readonly kind: 'mixed' }
  /** Records are missing between `expected` and the frame. */
  | { readonly kind: 'gap'; readonly expected: number };

export interface LedgerSnapshot {
  readonly next: number;
  readonly holes: readonly Hole[];
  /** Absent in what was stored before there were uploads. */
  readonly uploads?: UploadsSnapshot;
}

/** Holes remembered for a source; the oldest is given up beyond that, and can no longer be filled. */
export const mostHoles = 4096;

const inOrder: Admission = { kind: 'new' };
const repeat: Admission = { kind: 'repeat' };
const late: Admission = { kind: 'late' };
const mixed: Admission = { kind: 'mixed' };

/** What is known of one source's sequence: which records were taken, so that each counts once. */
export class SourceLedger {
  readonly uploads = new SourceUploads();
  #next = 1;
  #holes: Hole[] = [];

  /** The sequence expected next, 1 or more: where a source resumes. */
  get next(): number {
    return this.#next;
  }

  get holes(): readonly Hole[] {
    return this.#holes;
  }

  /** Where a frame of `records` records from sequence `first` on belongs; changes nothing. */
  place(first: number, records: number): Admission {
    if (first === this.#next) return inOrder;
    if (first > this.#next) return { kind: 'gap', expected: this.#next };
    const last = first + records - 1;
    const hole = this.#holes.find((one) => one.first <= last && first <= one.last);
    if (hole !== undefined) return hole.first <= first && last <= hole.last ? late : mixed;
    return last >= this.#next ? mixed : repeat;
  }

  /** Takes records in order, up to but not including `next`. */
  advance(next: number): void {
    this.#next = next;
  }

  /** Remembers sequences declared lost, just below `next`. */
  declareLost(first: number, records: number): void {
    this.#holes.push({ first, last: first + records - 1 });
    if (this.#holes.length > mostHoles) this.#holes.shift();
  }

  /** A late frame filled these sequences: what is left of their hole stays open. */
  fill(first: number, records: number): void {
    const last = first + records - 1;
    this.#holes = this.#holes.flatMap((hole) => {
      if (last < hole.first || first > hole.last) return [hole];
      const rest: Hole[] = [];
      if (hole.first < first) rest.push({ first: hole.first, last: first - 1 });
      if (last < hole.last) rest.push({ first: last + 1, last: hole.last });
      return rest;
    });
  }

  /** Rows without sequences are uploaded under this key from here on. */
  beginUpload(key: string, mark: string): void {
    this.uploads.begin(key, mark, this.#next);
  }

  endUpload(): void {
    this.uploads.end(this.#next);
  }

  snapshot(): LedgerSnapshot {
    return { next: this.#next, holes: [...this.#holes], uploads: this.uploads.snapshot() };
  }

  restore(from: LedgerSnapshot): void {
    this.#next = from.next;
    this.#holes = [...from.holes];
    if (from.uploads !== undefined) this.uploads.restore(from.uploads);
  }
}
