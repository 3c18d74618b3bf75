import { NotFound } from '../http/refusals.ts';
import { changeOf, type AccessBook } from './access-book.ts';
import type { Display } from './access-items.ts';
import { hashOfSecret, newId, newSecret } from './secret.ts';

export interface NewDisplay {
  readonly name: string;
  /** undefined: the whole plant. */
  readonly line?: string | undefined;
  /** Whether people may acknowledge there by PIN. */
  readonly acting: boolean;
}

/** A screen of the shop floor that sees and does nothing else; its token holds until it is revoked. */
export function makeDisplay(book: AccessBook, by: string, { name, line, acting }: NewDisplay): Promise<{ readonly id: string; readonly token: string }> {
  return book.exclusively(async () => {
    const [token, id] = [newSecret('vd_'), newId()];
    const display: Display = { hash: hashOfSecret(token), name, line: line ?? null, acting, made: book.now(), by, lastSeen: null };
    await book.write([book.displays.written(id, display)], [changeOf('display', by, `display ${id}: ${name}`, null, { line: display.line, acting })]);
    return { id, token };
  });
}

/** @throws NotFound */
export async function revokeDisplay(book: AccessBook, by: string, id: string): Promise<void> {
  await book.exclusively(async () => {
    const display = book.displays.get(id);
    if (display === undefined) throw new NotFound('there is no such display');
    await book.write([book.displays.dropped(id)], [changeOf('display', by, `display ${id}: ${display.name}`, { line: display.line, acting: display.acting }, null)]);
  });
  book.ended([id]);
}
