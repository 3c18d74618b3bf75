/** Too many failures, or too many requests at all: when to try again. */
export class TooManyTries extends Error {
  readonly statusCode = 429;
  /** Seconds, 1 or more. */
  readonly retryAfter: number;

  constructor(waitMs: number, what: 'tries that failed' | 'requests at a time' = 'tries that failed') {
    const seconds = Math.ceil(waitMs / 1000);
    super(`Too many ${what}; wait ${seconds} s and try again.`);
    this.retryAfter = seconds;
  }
}
