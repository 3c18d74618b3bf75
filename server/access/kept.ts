import * as v from 'valibot';
import type { AccessItem, AccessItemKey } from './access-file.ts';

/** Something kept for access that cannot be read: which, and what is wrong with it. */
export class DamagedAccessItem extends Error {}

/** All items of one kind by their ids, in memory as they are on disk. */
export class Kept<T> {
  readonly kind: string;
  readonly #schema: v.GenericSchema<T>;
  readonly #items = new Map<string, T>();

  constructor(kind: string, schema: v.GenericSchema<T>) {
    this.kind = kind;
    this.#schema = schema;
  }

  get size(): number {
    return this.#items.size;
  }

  get(id: string): T | undefined {
    return this.#items.get(id);
  }

  entries(): [string, T][] {
    return [...this.#items];
  }

  /** The first that fits. */
  find(fits: (item: T) => boolean): [string, T] | undefined {
    for (const entry of this.#items) if (fits(entry[1])) return entry;
    return undefined;
  }

  /** @throws DamagedAccessItem for a body that is not of this kind */
  load({ id, body }: AccessItem): void {
    let read: v.SafeParseResult<v.GenericSchema<T>>;
    try {
      read = v.safeParse(this.#schema, JSON.parse(body));
    } catch {
      throw new DamagedAccessItem(`access data: ${this.kind} ${id} is not JSON; restore a backup`);
    }
    if (!read.success) throw new DamagedAccessItem(`access data: ${this.kind} ${id}: ${v.getDotPath(read.issues[0]) ?? ''} ${read.issues[0].message}; restore a backup`);
    this.#items.set(id, read.output);
  }

  /** As it is to be written; nothing changes here before it is. */
  written(id: string, item: T): Staged {
    return { put: { kind: this.kind, id, body: JSON.stringify(item) }, apply: () => void this.#items.set(id, item) };
  }

  dropped(id: string): Staged {
    return { drop: { kind: this.kind, id }, apply: () => void this.#items.delete(id) };
  }
}

/** One change, on its way to the disk. */
export interface Staged {
  readonly put?: AccessItem;
  readonly drop?: AccessItemKey;
  readonly apply: () => void;
}
