// A helper process of a benchmark: it is asked by messages and answers each in turn; it ends with its parent.
import { fork } from 'node:child_process';
import { fileURLToPath } from 'node:url';

/** Starts another benchmark file as a process of its own. @returns how to ask it, and how to end it */
export async function forked(file, args = [], execArgv = []) {
  const child = fork(fileURLToPath(new URL(file, import.meta.url)), args, { execArgv, serialization: 'advanced' });
  const waiting = [];
  let ready;
  const started = new Promise((resolve) => (ready = resolve));
  child.once('exit', (code) => {
    console.error(`${file} ended with code ${code}`);
    process.exit(1); // whoever waits for it would wait for ever
  });
  child.on('message', (message) => {
    if (message.ready) ready(message);
    else waiting.shift()?.(message.answer);
  });
  const { told } = await started;
  return {
    told,
    pid: child.pid,
    ask: (what, how) => new Promise((resolve) => {
      waiting.push(resolve);
      child.send({ what, how });
    }),
    end: () => new Promise((resolve) => {
      child.removeAllListeners('exit');
      child.once('exit', resolve);
      child.disconnect();
    }),
  };
}

/** The helper's side: `calls` by name, each answers with a value or a promise of one. `told` reaches the parent at the start. */
export function answering(calls, told, onEnd = () => undefined) {
  let last = Promise.resolve();
  process.on('message', ({ what, how }) => {
    last = last.then(async () => process.send({ answer: await calls[what](how) }));
  });
  process.on('disconnect', async () => {
    await onEnd();
    process.exit(0);
  });
  process.send({ ready: true, told });
}
