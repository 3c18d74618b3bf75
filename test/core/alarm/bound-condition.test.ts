import { describe, expect, it } from 'vitest';
import { BoundCondition, type ConditionChange } from '../../../core/alarm/bound-condition.ts';
import type { Assessment } from '../../../core/evidence/assessment.ts';
import type { EvidenceState } from '../../../core/evidence/evidence-state.ts';

const says = (state: EvidenceState, back = true): Assessment => ({ state, backFromCrossing: back && state === 'demonstrated', backFromViolation: back && state !== 'violated' });

function changes(kind: 'crossing' | 'violation', units: number, seen: readonly (readonly [number, Assessment])[]): readonly (readonly [number, ConditionChange])[] {
  const condition = new BoundCondition(kind, { distance: 0, units });
  return seen.map(([position, now]) => [position, condition.weigh(now, position)] as const).filter(([, change]) => change !== undefined);
}

describe('the condition of a bound', () => {
  it('[A6] begins when demonstrated ends, and not before anything was demonstrated', () => {
    expect(changes('crossing', 0, [[1, says('gathering')], [2, says('undecided')], [3, says('violated')]])).toEqual([]);
    expect(changes('crossing', 0, [[1, says('demonstrated')], [2, says('undecided')]])).toEqual([[2, 'begins']]);
    expect(changes('violation', 0, [[1, says('undecided')], [2, says('violated')]])).toEqual([[2, 'begins']]);
  });

  it('[A7] ends only with the bound back by the distance and for the units in a row', () => {
    const crossed = [[1, says('demonstrated')], [2, says('undecided')]] as const;
    expect(changes('crossing', 0, [...crossed, [3, says('demonstrated', false)], [4, says('demonstrated')]])).toEqual([[2, 'begins'], [4, 'ends']]);
    expect(changes('crossing', 5, [...crossed, [3, says('demonstrated')], [7, says('demonstrated')], [8, says('demonstrated')]])).toEqual([[2, 'begins'], [8, 'ends']]);
    expect(changes('violation', 5, [[1, says('violated')], [2, says('undecided')], [6, says('undecided', false)], [7, says('undecided')], [12, says('undecided')]])).toEqual([[1, 'begins'], [12, 'ends']]);
  });

  it('[A8] does not chatter while the bound goes to and fro', () => {
    const toAndFro = Array.from({ length: 40 }, (_, k) => [k + 2, says(k % 2 === 0 ? 'undecided' : 'demonstrated')] as const);
    expect(changes('crossing', 3, [[1, says('demonstrated')], ...toAndFro])).toEqual([[2, 'begins']]);
  });

  it('[A3] unknown evidence raises and clears nothing, and units in a row begin anew', () => {
    expect(changes('crossing', 3, [[1, says('demonstrated')], [2, says('unknown')], [3, says('undecided')], [4, says('demonstrated')], [6, says('unknown')], [7, says('demonstrated')], [9, says('demonstrated')], [10, says('demonstrated')]])).toEqual([[3, 'begins'], [10, 'ends']]);
  });

  it('says when waiting alone would end it', () => {
    const condition = new BoundCondition('crossing', { distance: 0, units: 50 });
    condition.weigh(says('demonstrated'), 1);
    expect(condition.dueAt()).toBe(Infinity);
    condition.weigh(says('undecided'), 2);
    condition.weigh(says('demonstrated'), 10);
    expect(condition.dueAt()).toBe(60);
  });

  it('goes on from its snapshot', () => {
    const condition = new BoundCondition('crossing', { distance: 0, units: 5 });
    for (const [position, now] of [[1, says('demonstrated')], [2, says('undecided')], [3, says('demonstrated')]] as const) condition.weigh(now, position);
    const again = new BoundCondition('crossing', { distance: 0, units: 5 });
    again.restore(condition.snapshot());
    expect(again.weigh(says('demonstrated'), 8)).toBe('ends');
  });
});
