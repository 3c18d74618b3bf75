import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { checkFile } from './check-file.ts';
import type { Outcome } from './outcome.ts';

const mostNamed = 20;

function report(file: string, outcomes: readonly Outcome[]): boolean {
  const met = outcomes.filter((outcome) => outcome.kind === 'met');
  const beyond = outcomes.filter((outcome) => outcome.kind === 'beyond');
  const disputed = outcomes.filter((outcome) => outcome.kind === 'disputed');
  const unanswered = outcomes.filter((outcome) => outcome.kind === 'unanswered');
  const worst = [...met, ...beyond].reduce((most, { error }) => Math.max(most, error), 0);
  console.log(
    `${basename(file)}: rows ${outcomes.length}, evaluated ${outcomes.length - unanswered.length}, ` +
      `worst relative error ${worst.toExponential(1)}, beyond tolerance ${beyond.length}` +
      (disputed.length > 0 ? `, published figures that do not hold ${disputed.length}` : ''),
  );
  name('beyond', beyond.map(({ row, error, found }) => `${row}: found ${found} (${error.toExponential(1)})`));
  name('nothing evaluates', unanswered.map(({ row }) => row));
  for (const { row, reason } of disputed) console.log(`  does not hold: ${row}: ${reason}`);
  return beyond.length === 0 && unanswered.length === 0;
}

function name(what: string, rows: readonly string[]): void {
  for (const row of rows.slice(0, mostNamed)) console.log(`  ${what}: ${row}`);
  if (rows.length > mostNamed) console.log(`  ${what}: and ${rows.length - mostNamed} more`);
}

function check(file: string): boolean {
  try {
    return report(file, checkFile(JSON.parse(readFileSync(file, 'utf8'))));
  } catch (cause) {
    console.log(`${file}: ${String(cause)}`);
    return false;
  }
}

const files = process.argv.slice(2);
if (files.length === 0) console.log('usage: check-values FILE…');
process.exitCode = files.length > 0 && files.map(check).every(Boolean) ? 0 : 1;
