/** Resolves with the name of the signal that asks the process to end; a second one ends it at once. */
export function untilToldToStop(): Promise<string> {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM'] as const) {
      process.once(signal, () => {
        process.once(signal, () => process.exit(130));
        resolve(signal);
      });
    }
  });
}
