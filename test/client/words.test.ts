import { describe, expect, it } from 'vitest';
import { laneSentence } from '../../client/lane-sentence.ts';
import { headline, marginWords, promiseWords, saidByState, standing, windowWords } from '../../client/words.ts';
import { alarm, card, english, lane, loose, view } from './made-up.ts';

describe('words', () => {
  it.each([
    [0, 0, 'No guarantees yet.'], [0, 8, 'None of 8 guarantees needs you.'], [1, 8, '1 of 8 guarantees needs you.'], [2, 8, '2 of 8 guarantees need you.'], [0, 1, 'The guarantee needs nothing from you.'],
  ])('headline of %d in %d', (needing, all, words) => {
    expect(headline(english, needing, all)).toBe(words);
  });

  it('the margin counts what a person can count', () => {
    const words = (margin: object, state: 'demonstrated' | 'undecided' | 'gathering' = 'demonstrated', of = card()): string | undefined => marginWords(english, of, view({ margin, state }));
    expect(words({ canTake: 3 })).toBe('Can take 3 more nonconforming units');
    expect(words({ canTake: 1 })).toBe('Can take 1 more nonconforming unit');
    expect(words({ canTake: 0 })).toBe('Can take no more nonconforming units');
    expect(words({ canTake: 19 }, 'demonstrated', card({ quantity: 'rate' }))).toBe('Can take 19 more nonconformities');
    expect(words({ conformingToDemonstrate: 1420 }, 'undecided')).toBe('Demonstrated again after 1,420 conforming units in a row');
    expect(words({ unitsToGather: 231 }, 'gathering')).toBe('Needs 231 more conforming units');
    const litres = card({ scale: { kind: 'measure', unit: 'ml' } });
    expect(loose(words({ clearance: 0.96 }, 'demonstrated', litres) ?? '')).toBe('Bound stands 0.96 ml inside the line');
    expect(loose(words({ clearance: -0.2 }, 'undecided', litres) ?? '')).toBe('Bound stands 0.2 ml beyond the line');
    expect(words({})).toBeUndefined();
  });

  it('an unknown lane says why, not a margin', () => {
    expect(standing(english, card(), view({ state: 'unknown', remark: 'No record for 4 min', margin: { canTake: 3 } }))).toBe('No record for 4 min');
  });

  it('promises and windows', () => {
    expect(loose(promiseWords(english, card()))).toBe('at most 200 ppm nonconforming');
    expect(loose(promiseWords(english, card({ quantity: 'fraction-beyond-limit', specificationLimit: { side: 'below', value: 1200, unit: 'N' } })))).toBe('at most 200 ppm below 1,200 N');
    expect(windowWords(english, { kind: 'units', units: 50_000 })).toBe('the last 50,000 units');
    expect(windowWords(english, { kind: 'time', spanMs: 28_800_000 as never, stepMs: 60_000 as never })).toBe('the last 8 h');
  });

  it('a lane as a sentence begins with its name and leaves out nothing that is drawn', () => {
    const waiting = lane('BH-4 leak test', 1.12, { state: 'undecided', bound: 224e-6, margin: { conformingToDemonstrate: 900 }, drift: 'rising' }, [alarm({ priority: 'high' })]);
    expect(loose(laneSentence(english, waiting, '3 s'))).toBe(
      'BH-4 leak test, Hose line A: Undecided. Upper bound 224 ppm; promised at most 200 ppm nonconforming; 95 % confidence, one look. Allowance used 112 %. ' +
      'Demonstrated again after 900 conforming units in a row. Bound rising. Newest record 3 s ago. Alarm, high priority, not acknowledged: Bound crossed the guarantee line.',
    );
  });

  it('an alarm is left unsaid only where the state says the same', () => {
    expect(saidByState('violated', 'violation')).toBe(true);
    expect(saidByState('demonstrated', 'deterioration')).toBe(false);
    expect(saidByState('undecided', 'violation')).toBe(false);
  });
});
