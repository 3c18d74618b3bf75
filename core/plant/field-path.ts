/** Names of fields and places in lists (from 0) that lead to a value in the plant file. */
export type FieldPath = readonly (string | number)[];

/** A path as people write it, e.g. guarantees[2].at-most; empty for the file as a whole. */
export function fieldText(path: FieldPath): string {
  return path.map((step, at) => (typeof step === 'number' ? `[${step}]` : at === 0 ? step : `.${step}`)).join('');
}

/** A value as a person would write it, at most 60 characters. */
export function foundText(value: unknown): string {
  if (value === undefined || value === null) return 'nothing';
  if (typeof value === 'string') return `'${value.length > 58 ? `${value.slice(0, 57)}…` : value}'`;
  if (Array.isArray(value)) return value.length === 0 ? 'an empty list' : 'a list';
  return typeof value === 'number' || typeof value === 'boolean' ? String(value) : 'a mapping';
}
