/** Calls `act` every `spanMs` of wall time until the returned stop is called; does not keep the process alive. */
export function repeatEvery(spanMs: number, act: () => void): () => void {
  const timer = setInterval(act, spanMs);
  timer.unref();
  return () => clearInterval(timer);
}
