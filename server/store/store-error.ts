/**
 * Why the store could not do what was asked.
 * 'in-use': another server has the data directory. 'newer-schema': written by a newer version of the program.
 * 'damaged': not a database, or broken. 'disk-full', 'input-output': the disk. 'not-rising': a journal id that is
 * not above the ones before. 'overrun': more waits for the disk than the store may hold. 'refused': an earlier commit
 * failed, so nothing more is taken. 'closed': the store was closed. 'worker-ended': its thread ended by itself.
 * 'not-built': the thread's program was not compiled. 'bad-source', 'name-taken', 'unknown-source': source register.
 * 'bad-request': a read that names an impossible range. 'failed': anything else; the message says what.
 */
export type StoreFault =
  | 'in-use'
  | 'newer-schema'
  | 'damaged'
  | 'disk-full'
  | 'input-output'
  | 'not-rising'
  | 'overrun'
  | 'refused'
  | 'closed'
  | 'worker-ended'
  | 'not-built'
  | 'bad-source'
  | 'name-taken'
  | 'unknown-source'
  | 'bad-request'
  | 'failed';

export class StoreError extends Error {
  readonly fault: StoreFault;

  constructor(fault: StoreFault, message: string, options?: ErrorOptions) {
    super(message, options);
    this.name = 'StoreError';
    this.fault = fault;
  }
}
