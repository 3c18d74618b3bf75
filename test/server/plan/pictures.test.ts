import { describe, expect, it } from 'vitest';
import { barPicture } from '../../../server/plan/bar-picture.ts';
import { curvePicture } from '../../../server/plan/curve-picture.ts';
import { percent } from '../../../server/plan/demonstration-answer.ts';
import { planText } from '../../../server/plan/plan-answer.ts';

const curve = { from: 0, to: 100, line: 50, label: 'true rate', title: 'Chance', written: String };

describe('a curve', () => {
  it('has a dot in every column, at the height of its chance', () => {
    const lines = curvePicture({ ...curve, chance: (x) => 1 - x / 100 });
    const rows = lines.slice(1, 12).map((row) => row.slice(7));
    expect(rows).toHaveLength(11);
    for (let x = 0; x <= 60; x++) expect(rows[Math.round((x / 60) * 10)]![x]).toBe('●');
    expect(rows.join('').split('●')).toHaveLength(62);
  });

  it('joins a steep step, and shows the guarantee line in its column', () => {
    const rows = curvePicture({ ...curve, chance: (x) => Number(x < 70) }).slice(1, 12).map((row) => row.slice(7));
    expect(rows.map((row) => row[30])).toEqual(['●', ...new Array<string>(10).fill('┊')]);
    expect(rows.map((row) => row[42])).toEqual([' ', ...new Array<string>(9).fill('│'), '●'].map((mark, at) => (at === 0 ? undefined : mark)));
  });

  it('names the ends of its axis and fits a narrow terminal', () => {
    const lines = curvePicture({ ...curve, line: undefined, chance: () => 0.5 });
    expect(lines[13]).toMatch(/^ +0 +25 +50 +75 +100$/);
    expect(lines.at(-1)).toBe('true rate');
    for (const line of lines) expect(line.length).toBeLessThanOrEqual(72);
  });
});

it('bars are as long as the logarithm of their figure', () => {
  const [title, ...bars] = barPicture('Units', [10, 1000, 100_000].map((value) => ({ name: `at ${value}`, value, written: String(value) })));
  expect(title).toBe('Units (logarithmic scale from 10)');
  expect(bars.map((bar) => bar.split('█').length - 1)).toEqual([1, 20, 40]);
  expect(bars[0]).toMatch(/^ {4}at 10 ┤█ 10$/);
  expect(barPicture('Units', [])).toEqual([]);
});

it('a chance is never written as certain where it is not', () => {
  expect([0, 1e-9, 0.0006, 0.5, 0.9996, 1 - 1e-9, 1].map(percent)).toEqual(['0.0 %', '< 0.1 %', '0.1 %', '50.0 %', '> 99.9 %', '> 99.9 %', '100.0 %']);
});

it('a table stands in columns', () => {
  const text = planText({ sentences: ['Said.'], table: { head: ['a', 'bb'], rows: [['first', '1'], ['x', '22222']] }, picture: [], notes: [['Source', 'none']], json: {} });
  expect(text).toBe('Said.\n\na          bb\n─────   ─────\nfirst       1\nx       22222\n\nSource   none\n');
});
