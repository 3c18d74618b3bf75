/** How many digits a PIN has, both ends allowed. */
export const pinLength = { least: 4, most: 8 } as const;

/**
 * What is wrong with a new PIN, as a sentence without its full stop; undefined if nothing is. Those that are tried first
 * are refused: one digit again and again, and digits that run up or down by one.
 */
export function pinFault(pin: string): string | undefined {
  if (!/^\d+$/.test(pin) || pin.length < pinLength.least || pin.length > pinLength.most) return `a PIN has ${pinLength.least} to ${pinLength.most} digits`;
  const steps = new Set([...pin].slice(1).map((digit, before) => Number(digit) - Number(pin[before])));
  const [step = 2] = steps;
  if (steps.size > 1 || Math.abs(step) > 1) return undefined;
  return step === 0 ? 'a PIN is not one digit again and again' : 'a PIN is not a run of digits, as 1234 is';
}
