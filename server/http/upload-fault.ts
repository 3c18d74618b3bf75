import type { Refusal } from '../../core/record/refusal.ts';

/** Why an upload ended before its end, as the answer says it. */
export class UploadFault extends Error {
  readonly status: number;
  readonly code: string;
  readonly details: Readonly<Record<string, string | number>>;
  /** Of the row that was not taken, where it was that. */
  readonly refusal: Refusal | undefined;

  constructor(status: number, code: string, message: string, details: Readonly<Record<string, string | number>> = {}, refusal?: Refusal) {
    super(message);
    this.status = status;
    this.code = code;
    this.details = details;
    this.refusal = refusal;
  }
}

/** The fault that a refused row is. */
export function faultOfRow(refusal: Refusal): UploadFault {
  const { code, sentence, field, value, expected, line } = refusal;
  const status = code === 'station-not-allowed' || code === 'product-not-allowed' ? 403 : code === 'frame-too-large' ? 413 : 400;
  return new UploadFault(status, code, sentence, { line: line ?? 1, ...(field === '' ? {} : { field }), value, expected }, refusal);
}

export const faults = {
  interrupted: (): UploadFault => new UploadFault(409, 'replaced', 'The source connected elsewhere; the upload was ended.'),
  stopping: (): UploadFault => new UploadFault(503, 'stopping', 'The server is stopping; send the same again later.'),
  notStored: (): UploadFault => new UploadFault(503, 'not-stored', 'The server cannot store records now.'),
  busy: (): UploadFault => new UploadFault(409, 'busy', 'The source is connected, or another of its uploads runs; one at a time.'),
  keyMissing: (line: number): UploadFault =>
    new UploadFault(400, 'idempotency-key-missing', 'Rows without sequences need a header Idempotency-Key, so that a repeated request counts nothing twice.', { line, field: 'sequence', expected: 'a sequence in every row, or an Idempotency-Key' }),
  keyReused: (): UploadFault => new UploadFault(422, 'idempotency-key-reused', 'Other rows were uploaded under this Idempotency-Key; every upload needs one of its own.'),
  superseded: (records: number): UploadFault =>
    new UploadFault(409, 'superseded', `Other records of the source came after the first ${records} of these; send the rest under another key.`),
  gap: (line: number, first: number, expected: number): UploadFault =>
    new UploadFault(409, 'sequence-gap', `sequence is ${first}; expected ${expected}, or a lost row that spends those between.`, { line, field: 'sequence', value: first, expected }),
};
