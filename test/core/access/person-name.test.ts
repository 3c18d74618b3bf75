import { describe, expect, it } from 'vitest';
import { keptName, nameKey, personNameFault } from '../../../core/access/person-name.ts';

describe('a name on the record', () => {
  it.each(['Mette Holm', "Søren O'Brien-Łukasz", 'Иван Петров', '山田 花子', 'محمد علي', 'Åse 2', 'Γιώργος'])('may be %s', (name) => {
    expect(personNameFault(name)).toBeUndefined();
  });

  it.each([
    ['Mette\u202e mloH', 'invisible'], ['Mette\u200b Holm', 'invisible'], ['Mette\nHolm', 'invisible'], ['Mette\u2028Holm', 'invisible'], ['Mette\u0000', 'invisible'],
    ['M\u0435tte Holm', 'one alphabet'], ['\u039flaf', 'one alphabet'],
  ])('is not %j', (name, why) => {
    expect(personNameFault(name)).toContain(why);
  });

  it('is the same however it is typed', () => {
    for (const same of ['METTE HOLM', ' mette   holm ', 'Mette\u00a0Holm', 'Ｍette Holm']) expect(nameKey(same)).toBe('mette holm');
    expect(nameKey('A\u030ase')).toBe(nameKey('\u00e5se'));
    expect(nameKey('Mette Holm')).not.toBe(nameKey('Mette Holn'));
    expect(keptName('  A\u030ase \t Berg ')).toBe('\u00c5se Berg');
  });
});
