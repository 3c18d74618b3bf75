/** Calls `act` every `spanMs` of wall time until the returned stop is called; does not keep the process alive. */
export function repeatEvery(spanMs: number, act: () => void): () => void {
  const timer = setInterval(act, spanMs);
  timer.unref();
  return () => clearInterval(timer);
}

/** The same for what takes its time: while it is not done, it does not begin again. */
export function repeatInTurn(spanMs: number, act: () => Promise<void>): () => void {
  let done = true;
  return repeatEvery(spanMs, () => {
    if (!done) return;
    done = false;
    void act().finally(() => {
      done = true;
    });
  });
}
