import type { Refusal } from '../../core/record/refusal.ts';

/** A refused row as a person reads it: where, why. */
export function refusalText(file: string, { line, code, sentence }: Refusal): string {
  return `${file === '-' ? 'standard input' : file}:${line ?? 1}: ${sentence} (${code})`;
}
