import { hash, verify, type Options } from '@node-rs/argon2';

/**
 * Argon2id with 19 MiB, 2 passes, 1 lane.
 * @source OWASP Password Storage Cheat Sheet; IETF RFC 9106 section 4 for the variant (both from memory)
 */
const cost: Options = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Hashings at the same time, and waiting: more are refused, so that nobody can make the server hash for ever. */
const mostAtOnce = 2;
const mostWaiting = 64;

/** @source length over rules of composition: NIST SP 800-63B section 5.1.1.2 (from memory); the numbers are ours */
export const passwordLength = { least: 12, most: 128 } as const;

/** Too many passwords are being checked just now. */
export class TooBusy extends Error {
  readonly statusCode = 503;
}

/** The same characters give the same password however a keyboard composed them. */
const normal = (password: string): string => password.normalize('NFKC');

/**
 * What is wrong with a new password, in words; undefined if it will do.
 *
 * @param about words that must not make it up: names of the person, the plant, the program
 */
export function passwordFault(password: string, about: readonly string[]): string | undefined {
  const characters = [...normal(password)];
  if (characters.length < passwordLength.least) return `at least ${passwordLength.least} characters; several words are easy to keep`;
  if (characters.length > passwordLength.most) return `at most ${passwordLength.most} characters`;
  if (new Set(characters).size < 5) return 'at least 5 different characters';
  const bare = (text: string): string => text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');
  let left = bare(normal(password));
  for (const word of about) if (bare(word).length > 2) left = left.replaceAll(bare(word), '');
  return left.length < passwordLength.least / 2 ? 'more than the names of person, plant and program' : undefined;
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
