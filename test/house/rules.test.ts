import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';

const top = new URL('../..', import.meta.url).pathname;
const tests = readdirSync(join(top, 'test'), { recursive: true, encoding: 'utf8' }).filter((path) => path.endsWith('.test.ts') && !path.includes('house'));
const titles = tests.flatMap((path) => [...readFileSync(join(top, 'test', path), 'utf8').matchAll(/\b(?:it|test)(?:\.\w+)*\(\s*['"`]((?:\[[A-Z]\d+\])+)/g)].map((match) => match[1] ?? ''));
const tested = new Set(titles.flatMap((title) => [...title.matchAll(/[A-Z]\d+/g)].map(([number]) => number)));
const stated = [...readFileSync(join(top, 'core/rules.md'), 'utf8').matchAll(/^- \*\*([A-Z]\d+)\*\*/gm)].map((match) => match[1] ?? '');

describe('the numbered rules', () => {
  it('each have a test that begins with their number', () => {
    expect(stated.length).toBeGreaterThan(20);
    expect(stated.filter((number) => !tested.has(number))).toEqual([]);
  });

  it('are all the numbers that tests speak of', () => {
    expect([...tested].filter((number) => !stated.includes(number))).toEqual([]);
    expect(new Set(stated).size).toBe(stated.length);
  });
});
