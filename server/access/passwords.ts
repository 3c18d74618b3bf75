import { hash, verify, type Options } from '@node-rs/argon2';
import { passwordFault, passwordLength } from '../../core/access/password-length.ts';

/**
 * Argon2id with 19 MiB, 2 passes, 1 lane.
 * @source OWASP Password Storage Cheat Sheet; IETF RFC 9106 section 4 for the variant (both from memory)
 */
const cost: Options = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Hashings at the same time, and waiting: more are refused, so that nobody can make the server hash for ever. */
const mostAtOnce = 2;
const mostWaiting = 64;

/** Too many passwords are being checked just now. */
export class TooBusy extends Error {
  readonly statusCode = 503;
}

/** The same characters give the same password however a keyboard composed them. */
const normal = (password: string): string => password.normalize('NFKC');

/**
 * What is wrong with a new password, as a sentence without its full stop; undefined if nothing is. Length is asked of it,
 * and that it is more than what anybody would try first; nobody's list of breached passwords is shipped.
 *
 * @param about words that must not make it up: names of the person, the plant, the program
 */
export function newPasswordFault(password: string, about: readonly string[]): string | undefined {
  const text = normal(password);
  const fault = passwordFault(text);
  if (fault !== undefined) return fault;
  if (new Set(text).size < 5) return 'a password has at least 5 different characters';
  const bare = (word: string): string => word.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');
  let left = bare(text);
  const words = about.map(bare).filter((word) => word.length > 2).sort((a, b) => b.length - a.length);
  for (const word of words) left = left.replaceAll(word, '');
  return left.length < passwordLength.least / 2 ? 'a password is more than the names of person, plant and program' : undefined;
}

/** Makes and checks what is kept of passwords and PINs. */
export class Passwords {
  #busy = 0;
  readonly #waiting: (() => void)[] = [];
  #dummy: Promise<string> | undefined;

  /** Hashings done since the start; what a test counts. */
  hashings = 0;

  hash(password: string): Promise<string> {
    return this.#inTurn(() => hash(normal(password), cost));
  }

  /** An unknown or password-less account costs the same as a known one. */
  async matches(kept: string | null | undefined, password: string): Promise<boolean> {
    const known = kept ?? (await (this.#dummy ??= hash('nobody has this password', cost)));
    const matches = await this.#inTurn(() => verify(known, normal(password)));
    return matches && typeof kept === 'string';
  }

  async #inTurn<T>(act: () => Promise<T>): Promise<T> {
    if (this.#busy >= mostAtOnce) {
      if (this.#waiting.length >= mostWaiting) throw new TooBusy('Many people sign in just now; try again in a few seconds.');
      await new Promise<void>((resolve) => this.#waiting.push(resolve));
    } else this.#busy += 1;
    try {
      this.hashings += 1;
      return await act();
    } finally {
      const next = this.#waiting.shift();
      if (next) next();
      else this.#busy -= 1;
    }
  }
}
