/** The same text, but whoever waits for its next piece is told at once when the signal is given, with its reason. */
export function untilAborted(text: AsyncIterator<Uint8Array>, signal: AbortSignal): AsyncIterator<Uint8Array> {
  return {
    next: () =>
      new Promise((resolve, reject) => {
        const abort = (): void => reject(signal.reason as Error);
        if (signal.aborted) return abort();
        signal.addEventListener('abort', abort, { once: true });
        text.next().then(resolve, reject).finally(() => signal.removeEventListener('abort', abort));
      }),
  };
}
