import type { ProductId, StationId } from '../../core/record/part.ts';

/** A device or program that may send records. */
export interface Source {
  /** Whole, 1 or more, never given twice. */
  readonly id: number;
  /** Unique, also among revoked ones: history speaks of it. 1 to 64 letters, digits and . _ - */
  readonly name: string;
  /** Stations it may send for, one or more. */
  readonly stations: readonly StationId[];
  /** Products it may send for; empty: every product. */
  readonly products: readonly ProductId[];
  /** ms since 1970-01-01 UTC. */
  readonly created: number;
  readonly lastUsed: number | undefined;
  /** Since when its token is no longer taken. */
  readonly revoked: number | undefined;
  /** Until when the token before the last renewal is taken, too; undefined if it is not. */
  readonly oldUntil: number | undefined;
}

/** A source with its token, shown this once: only the token's hash is kept. */
export interface TokenGrant {
  readonly source: Source;
  readonly token: string;
}

/** Who changes a source, and why; the command line where nobody is named. */
export interface SourceDoer {
  readonly who: string;
  readonly why: string;
}

export interface NewSource {
  readonly name: string;
  readonly stations: readonly StationId[];
  readonly products?: readonly ProductId[] | undefined;
  /** ms since 1970-01-01 UTC. */
  readonly at: number;
  readonly doer?: SourceDoer | undefined;
}

export interface Renewal {
  readonly name: string;
  /** Until when the old token is taken beside the new one, ms since 1970-01-01 UTC; absent: it is refused from now on. */
  readonly oldUntil?: number | undefined;
  readonly doer?: SourceDoer | undefined;
}

/** Who may send. Times are ms since 1970-01-01 UTC. */
export interface SourceRegister {
  /** @throws StoreError 'name-taken', 'bad-source' (message names field, value and what was expected) */
  add(source: NewSource): Promise<TokenGrant>;
  /** A new token in place of the old one; brings a revoked source back. @throws StoreError 'unknown-source' */
  rotate(renewal: Renewal): Promise<TokenGrant>;
  /** Its tokens are refused from now on. @throws StoreError 'unknown-source' */
  revoke(name: string, at: number, doer?: SourceDoer): Promise<Source>;
  /** All, by name. */
  list(): Promise<readonly Source[]>;
  /** Whose token this is at a time; undefined for an unknown, replaced or revoked one. */
  ofToken(token: string, at: number): Promise<Source | undefined>;
  /** Hashes of all tokens that are taken at a time, hexadecimal: what open connections are held against. */
  heldHashes(at: number): Promise<readonly string[]>;
  /** Notes that the source was heard. @throws StoreError 'unknown-source' */
  used(id: number, at: number): Promise<void>;
}
