import { refuse } from './refusal.ts';

/** What a JSON text holds; refused when it is none. */
export function parsedJson(text: string, expected: string): unknown {
  try {
    return JSON.parse(text);
  } catch (cause) {
    return refuse('not-json', '', cause instanceof Error ? cause.message : text, expected);
  }
}
