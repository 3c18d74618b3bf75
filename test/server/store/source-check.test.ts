import { describe, expect, it } from 'vitest';
import { checkSource } from '../../../server/store/source-check.ts';

describe('what a source may be called and send for', () => {
  it('takes stations by name, and * for every station', () => {
    expect(() => checkSource('gateway', ['*'])).not.toThrow();
    expect(() => checkSource('leak tester', ['A.leak-test'])).toThrow(/name: "leak tester"/);
  });

  it.each(['', 'A leak', '**', 'A/*', 'x'.repeat(65)])('refuses the station %j by name', (station) => {
    expect(() => checkSource('gateway', [station])).toThrow(/station: .*expected 1 to 64 letters/);
  });
});
