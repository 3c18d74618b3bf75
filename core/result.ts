/** The answer of something that can fail for a foreseen reason: a value or a fault, never both. */
export type Result<T, F> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly fault: F };

export function ok<T>(value: T): Result<T, never> {
  return { ok: true, value };
}

export function fault<F>(of: F): Result<never, F> {
  return { ok: false, fault: of };
}
