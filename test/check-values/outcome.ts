/** How one row of a file came out. */
export type Outcome =
  | { readonly kind: 'met'; readonly error: number }
  | { readonly kind: 'beyond'; readonly row: string; readonly error: number; readonly found: string }
  | { readonly kind: 'disputed'; readonly row: string; readonly reason: string }
  | { readonly kind: 'unanswered'; readonly row: string };

/** Distance relative to the expected figure; to 0 only 0 is near. */
export function relativeError(found: number, expected: number): number {
  if (found === expected) return 0;
  const error = Math.abs((found - expected) / expected);
  return Number.isNaN(error) ? Infinity : error;
}

/** Runs one row; an answer that throws is beyond every tolerance and says why. */
export function outcomeOf(row: string, run: () => { readonly error: number; readonly within: boolean; readonly found: string }): Outcome {
  try {
    const { error, within, found } = run();
    return within ? { kind: 'met', error } : { kind: 'beyond', row, error, found };
  } catch (cause) {
    return { kind: 'beyond', row, error: Infinity, found: String(cause) };
  }
}
