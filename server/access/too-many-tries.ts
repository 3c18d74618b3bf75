/** Too many failures: when to try again. */
export class TooManyTries extends Error {
  readonly statusCode = 429;
  /** Seconds, 1 or more. */
  readonly retryAfter: number;

  constructor(waitMs: number) {
    const seconds = Math.ceil(waitMs / 1000);
    super(`Too many tries that failed; wait ${seconds} s and try again.`);
    this.retryAfter = seconds;
  }
}
