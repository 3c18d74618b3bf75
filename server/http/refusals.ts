/** What was asked for is not there. */
export class NotFound extends Error {
  readonly statusCode = 404;
}

/** It cannot be done as things stand now. */
export class Conflict extends Error {
  readonly statusCode = 409;
}

/** Nobody known asks. */
export class NotSignedIn extends Error {
  readonly statusCode = 401;

  constructor(message = 'Sign in first, or send a token that holds.') {
    super(message);
  }
}

/** Who asks may not do this. */
export class NotAllowed extends Error {
  readonly statusCode = 403;
}
