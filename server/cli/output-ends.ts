import { exitCode } from './exit-codes.ts';

/** Ends the process when its output cannot be written any more: quietly where whoever read it has read enough. */
export function endWithOutput(): void {
  process.stdout.on('error', (cause: NodeJS.ErrnoException) => {
    if (cause.code === 'EPIPE') process.exit(exitCode.done);
    process.stderr.write(`The output cannot be written: ${cause.message}\n`);
    process.exit(exitCode.failed);
  });
}
