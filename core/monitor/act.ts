/**
 * What a person did that changes an alarm or the evidence, or that rows without sequences began to be uploaded or
 * ended; kept in the journal like a record.
 */
export type Act =
  | { readonly kind: 'acknowledge'; readonly alarm: number; readonly by: string; readonly note: string }
  | { readonly kind: 'restart'; readonly guarantee: string; readonly by: string; readonly reason: string }
  | { readonly kind: 'upload-begun'; readonly source: string; readonly key: string; readonly mark: string }
  | { readonly kind: 'upload-ended'; readonly source: string };

/** Why an act changed nothing. */
export type ActFault = 'no-such-alarm' | 'already-acknowledged' | 'no-such-guarantee';
