import type { Change, ChangeKind, RecordedChange } from '../../core/access/change.ts';

/** Something kept for access: an account, a session, a token. `body` is JSON whose form the kind decides. */
export interface AccessItem {
  readonly kind: string;
  /** Unique within its kind. */
  readonly id: string;
  readonly body: string;
}

export type AccessItemKey = Pick<AccessItem, 'kind' | 'id'>;

/** What becomes durable together: items put in place of those with the same key, items dropped, what is recorded of it. */
export interface AccessWrite {
  readonly put?: readonly AccessItem[];
  readonly drop?: readonly AccessItemKey[];
  readonly changes?: readonly Change[];
}

export interface ChangeQuery {
  /** Wall time, ms since 1970-01-01 UTC; from (included) to (not included). */
  readonly from: number;
  readonly to: number;
  readonly kind?: ChangeKind;
  /** Text that stands in who, what or why; letters of either case. */
  readonly holds?: string;
  /** Page: only ids below this one. */
  readonly before?: number;
  /** 1 to 10,000. */
  readonly limit: number;
}

/** Where access data are kept, beside the journal in the same store. */
export interface AccessFile {
  /** All of it; small: people, not records. */
  items(): Promise<readonly AccessItem[]>;
  /** Durable when it resolves. @throws StoreError */
  write(write: AccessWrite): Promise<void>;
  /** The record of changes, newest first. */
  changes(query: ChangeQuery): Promise<readonly RecordedChange[]>;
}
