/** What a command's exit code says; listed in every help text. */
export const exitCode = {
  done: 0,
  /** The work ran and found something wrong (values beyond tolerance, a broken record of evidence, …). */
  foundWrong: 1,
  /** The command's arguments or input cannot be used. */
  badInput: 2,
  /** Something outside failed: disk, network, another server on the same data. */
  failed: 3,
} as const;

/** Ends a command with a sentence on standard error and an exit code. */
export class CommandFault extends Error {
  readonly code: number;

  constructor(message: string, code: number = exitCode.badInput) {
    super(message);
    this.code = code;
  }
}
