/** An argument for which the asked figure does not exist: which one, what it held, what was expected. */
export class OutOfDomain extends RangeError {
  readonly argument: string;
  readonly value: unknown;
  readonly expected: string;

  constructor(argument: string, value: unknown, expected: string) {
    super(`${argument} is ${String(value)}, expected ${expected}`);
    this.name = 'OutOfDomain';
    this.argument = argument;
    this.value = value;
    this.expected = expected;
  }
}

/** @throws OutOfDomain unless the value is whole and from least to most */
export function requireWhole(argument: string, value: number, least: number, most: number = Number.MAX_SAFE_INTEGER): void {
  if (Number.isSafeInteger(value) && value >= least && value <= most) return;
  const range = most === Number.MAX_SAFE_INTEGER ? `${least} or more` : `from ${least} to ${most}`;
  throw new OutOfDomain(argument, value, `a whole number, ${range}`);
}

/** @throws OutOfDomain unless the value is above 0 and below 1; false for NaN too */
export function requireInside(argument: string, value: number): void {
  if (value > 0 && value < 1) return;
  throw new OutOfDomain(argument, value, 'a number above 0 and below 1');
}

/** @throws OutOfDomain unless the value is above 0 and finite */
export function requirePositive(argument: string, value: number): void {
  if (value > 0 && value < Infinity) return;
  throw new OutOfDomain(argument, value, 'a finite number above 0');
}
