import type { BoundAnswer } from './bound-answer.ts';

/** The answer for people: the sentence, then what it rests on. */
export function boundText({ sentence, verdict, method, looks, notes }: BoundAnswer): string {
  const rows: readonly (readonly [string, string])[] = [
    ['Method', method.name],
    ...method.assumes.map((assumption, at) => [at === 0 ? 'Assumes' : '', assumption] as const),
    ...(looks === undefined ? [] : [['Looks', looks] as const]),
    ['Source', method.source],
    ...notes.map((note, at) => [at === 0 ? 'Mind' : '', note] as const),
  ];
  const head = verdict === undefined ? sentence : `${sentence}\n${verdict}`;
  return `${head}\n\n${rows.map(([name, said]) => `${name.padEnd(9)}${said}\n`).join('')}`;
}

/** The answer for programs, one line of JSON. */
export function boundJson({ quantity, sentence, figure, side, tail, confidence, verdict, method, looks, notes }: BoundAnswer): string {
  const { name, assumes, source } = method;
  return `${JSON.stringify({ quantity, [figure.name]: figure.value, side, confidence, tail, sentence, verdict, method: name, assumes, looks, source, notes })}\n`;
}
