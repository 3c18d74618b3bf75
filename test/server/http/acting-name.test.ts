import { describe, expect, it } from 'vitest';
import { anybody } from '../../../server/access/caller.ts';
import { actingName } from '../../../server/http/acting-name.ts';

const ines = { ...anybody, kind: 'account' as const, name: 'Ines Maurer' };

describe('the name an act is recorded under', () => {
  it('is given where access is open, and one has to be', () => {
    expect(actingName(anybody, 'Olaf')).toBe('Olaf');
    expect(() => actingName(anybody, undefined)).toThrow('by: nobody is named');
  });

  it("is the person's own once they are signed in, and nobody else's", () => {
    expect(actingName(ines, undefined)).toBe('Ines Maurer');
    expect(actingName(ines, 'Ines Maurer')).toBe('Ines Maurer');
    expect(() => actingName(ines, 'Olaf')).toThrow('you act under your own name');
  });
});
