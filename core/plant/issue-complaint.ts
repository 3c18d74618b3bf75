import type { BaseIssue } from 'valibot';
import type { FieldPath } from './field-path.ts';
import type { Complaint } from './plant-fault.ts';

/** What a schema found wrong, with the expectation its message carries. */
export function complaintOfIssue(issue: BaseIssue<unknown>): Complaint {
  const steps = issue.path ?? [];
  const path: FieldPath = steps.map(({ key }) => (typeof key === 'number' ? key : String(key)));
  const expected = issue.message;
  const known = expected.startsWith('one of ') ? expected.slice('one of '.length).split(', ') : [];
  const about = issue.type === 'never' ? 'unknown field' : issue.input === undefined && path.length > 0 ? 'missing' : 'value';
  return { path, found: issue.input, expected, about, known };
}
