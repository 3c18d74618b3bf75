import { writtenNumber } from '../../core/describe/rounded.ts';
import type { BoundAnswer } from './bound-answer.ts';
import type { SecondComputation } from './second-computation.ts';

/** The answer for people: the sentence, then what it rests on. */
export function boundText({ sentence, verdict, method, looks, second, notes }: BoundAnswer): string {
  const rows: readonly (readonly [string, string])[] = [
    ['Method', method.name],
    ...method.assumes.map((assumption, at) => [at === 0 ? 'Assumes' : '', assumption] as const),
    ['Looks', looks],
    ['Source', method.source],
    ...(second === undefined ? [] : [['Check', checkSentence(second)] as const]),
    ...notes.map((note, at) => [at === 0 ? 'Mind' : '', note] as const),
  ];
  const head = verdict === undefined ? sentence : `${sentence}\n${verdict}`;
  return `${head}\n\n${rows.map(([name, said]) => `${name.padEnd(9)}${said}\n`).join('')}`;
}

/** The answer for programs, one line of JSON. */
export function boundJson({ quantity, sentence, figure, side, tail, confidence, verdict, method, looks, second, notes }: BoundAnswer): string {
  const { name, assumes, source } = method;
  return `${JSON.stringify({ quantity, [figure.name]: figure.value, side, confidence, tail, sentence, verdict, method: name, assumes, looks, source, secondComputation: second, notes })}\n`;
}

function checkSentence({ chance, agrees }: SecondComputation): string {
  const written = writtenNumber(chance, 7);
  if (agrees) return `Computed a second time by jstat, which finds a chance of ${written} in the tail: the two agree.`;
  return `DO NOT USE: computed a second time by jstat, the chance in the tail is ${written}; the two disagree. Please report this.`;
}
