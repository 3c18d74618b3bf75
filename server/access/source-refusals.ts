import type { Refusal } from '../../core/record/refusal.ts';
import { changeOf } from './access-book.ts';
import type { AccessFile } from './access-file.ts';
import { Sparing } from './sparing.ts';

/** Lines a minute at most, of each kind. */
const mostBeyond = 60;
const mostUnknown = 10;

/** Keeps on record what was refused to sources: a token that is not known, a station or product that is not theirs. */
export class SourceRefusals {
  readonly #file: Pick<AccessFile, 'write'>;
  readonly #onFault: (cause: unknown) => void;
  readonly #beyond: Sparing;
  readonly #unknown: Sparing;

  /** @param now wall time, ms @param onFault told where a line could not be kept */
  constructor(file: Pick<AccessFile, 'write'>, now: () => number, onFault: (cause: unknown) => void) {
    this.#file = file;
    this.#onFault = onFault;
    this.#beyond = new Sparing(mostBeyond, now);
    this.#unknown = new Sparing(mostUnknown, now);
  }

  /** A frame or row was refused; kept where that was for want of a right. @param source its name */
  noteRefused(source: string, { code, value, expected }: Refusal): void {
    if (code !== 'station-not-allowed' && code !== 'product-not-allowed') return;
    const [what] = code.split('-');
    if (this.#beyond.lets(JSON.stringify([source, code, value]))) void this.#keep(`source ${source}`, `records of ${what ?? ''} ${value}`, { code, allowed: expected });
  }

  /** Somebody came with a token nobody has, or one that was withdrawn. @param address from where */
  async noteUnknown(what: string, address: string): Promise<void> {
    if (this.#unknown.lets(JSON.stringify([what, address]))) await this.#keep('unknown', what, { code: 'token-unknown', address: address.slice(0, 64) });
  }

  #keep(who: string, what: string, how: Readonly<Record<string, string>>): Promise<void> {
    return this.#file.write({ changes: [changeOf('refused', who, what, null, how)] }).catch(this.#onFault);
  }
}
