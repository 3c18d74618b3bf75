import type { StationId } from '../../core/record/part.ts';

/** A device or program that may send records. */
export interface Source {
  /** Whole, 1 or more, never given twice. */
  readonly id: number;
  /** Unique, also among revoked ones: history speaks of it. 1 to 64 letters, digits and . _ - */
  readonly name: string;
  /** Stations it may send for, one or more. */
  readonly stations: readonly StationId[];
  /** ms since 1970-01-01 UTC. */
  readonly created: number;
  readonly lastUsed: number | undefined;
  /** Since when its token is no longer taken. */
  readonly revoked: number | undefined;
}

/** A source with its token, shown this once: only the token's hash is kept. */
export interface TokenGrant {
  readonly source: Source;
  readonly token: string;
}

/** Who may send. Times are ms since 1970-01-01 UTC. */
export interface SourceRegister {
  /** @throws StoreError 'name-taken', 'bad-source' (message names field, value and what was expected) */
  add(name: string, stations: readonly StationId[], at: number): Promise<TokenGrant>;
  /** A new token in place of the old one, which is refused from now on; brings a revoked source back. @throws StoreError 'unknown-source' */
  rotate(name: string): Promise<TokenGrant>;
  /** @throws StoreError 'unknown-source' */
  revoke(name: string, at: number): Promise<Source>;
  /** All, by name. */
  list(): Promise<readonly Source[]>;
  /** Whose token this is; undefined for an unknown, replaced or revoked one. */
  ofToken(token: string): Promise<Source | undefined>;
  /** Notes that the source was heard. @throws StoreError 'unknown-source' */
  used(id: number, at: number): Promise<void>;
}
