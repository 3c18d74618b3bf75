import { describe, expect, it } from 'vitest';
import { passwordFault } from '../../../core/access/password-length.ts';
import { pinFault } from '../../../core/access/pin-fault.ts';

describe('a password', () => {
  it('is judged by its length alone', () => {
    expect(passwordFault('a'.repeat(11))).toBe('a password has 12 to 128 characters; this one has 11');
    expect(passwordFault('a'.repeat(12))).toBeUndefined();
    expect(passwordFault('a'.repeat(128))).toBeUndefined();
    expect(passwordFault('a'.repeat(129))).toMatch(/this one has 129$/);
  });

  it('is counted in characters, not in UTF-16 units', () => {
    expect(passwordFault('🚲'.repeat(6))).toMatch(/this one has 6$/);
    expect(passwordFault('🚲'.repeat(12))).toBeUndefined();
  });
});

describe('a PIN', () => {
  it.each(['4711', '1123', '10203040', '9753', '1212', '7890'.concat('1')])('%s may be one', (pin) => {
    expect(pinFault(pin)).toBeUndefined();
  });

  it.each(['', '123', '123456789', '12a4', '１２３５', ' 4711'])('%j is none', (pin) => {
    expect(pinFault(pin)).toBe('a PIN has 4 to 8 digits');
  });

  it.each([['0000', /again and again/], ['99999999', /again and again/], ['1234', /run/], ['56789', /run/], ['4321', /run/], ['3210', /run/]])('%s would be tried first', (pin, why) => {
    expect(pinFault(pin)).toMatch(why);
  });
});
