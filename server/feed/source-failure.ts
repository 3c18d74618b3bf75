import type { RefusedFrame } from '../../core/protocol/source-messages.ts';

/**
 * Why a source's frames will not get through, however often they are sent. 'refused': the server said so, or would.
 * 'gap': the records between what the server has and what is kept here are missing. 'gave-up': no success for too
 * long. 'closed': this side closed before all was acknowledged.
 */
export type SourceFailureKind = 'refused' | 'gap' | 'gave-up' | 'closed';

export interface FailurePlace {
  /** What the server said. */
  readonly refusal?: RefusedFrame;
  /** 1-based line of the text that the records come from. */
  readonly line?: number;
}

export class SourceFailure extends Error {
  readonly kind: SourceFailureKind;
  readonly refusal: RefusedFrame | undefined;
  readonly line: number | undefined;

  constructor(kind: SourceFailureKind, message: string, { refusal, line }: FailurePlace = {}) {
    super(message);
    this.kind = kind;
    this.refusal = refusal;
    this.line = line;
  }
}

/** The failure that a refusal of the server is. */
export function failureOf(refusal: RefusedFrame): SourceFailure {
  const { code, sentence, field, value, expected } = refusal;
  const where = field === undefined || sentence.includes(field) ? '' : ` ${field} is ${value ?? ''}; expected ${expected ?? ''}.`;
  return new SourceFailure('refused', `Refused (${code}): ${sentence}${where}`, { refusal });
}
