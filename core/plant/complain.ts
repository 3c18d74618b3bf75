import type { FieldPath } from './field-path.ts';

/** Notes that the value at a path does not fit; `known` are words of which one was probably meant. */
export type Complain = (path: FieldPath, expected: string, known?: readonly string[]) => void;

/** The same, for paths that begin further down. */
export function within(complain: Complain, prefix: FieldPath): Complain {
  return (path, expected, known) => complain([...prefix, ...path], expected, known);
}

/** 'a, b, c' with the end left out where the list is long. */
export function listText(words: readonly string[]): string {
  return words.length > 8 ? `${words.slice(0, 8).join(', ')}, …` : words.join(', ');
}
