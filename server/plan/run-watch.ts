import { performance } from 'node:perf_hooks';
import type { RunWatch } from './long-run.ts';

/**
 * Watches a long run for a person: how far it is on standard error, and Ctrl-C to cancel it. `end` takes the line of
 * progress away again and lets Ctrl-C end the process as usual.
 */
export function watchRun(): { readonly watch: RunWatch; readonly end: () => void } {
  const stop = new AbortController();
  let shown = false;
  const cancel = (): void => stop.abort();
  process.once('SIGINT', cancel);
  const wipe = process.stderr.isTTY ? '\r\u001b[K' : '';
  return {
    watch: {
      stop: stop.signal,
      now: () => performance.now(),
      progress(done) {
        shown = true;
        process.stderr.write(`${wipe}simulating: ${Math.floor(100 * done)} % (Ctrl-C cancels)${wipe === '' ? '\n' : ''}`);
      },
    },
    end() {
      process.off('SIGINT', cancel);
      if (shown && wipe !== '') process.stderr.write(wipe);
    },
  };
}
