import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { BadDemoData, demoData } from '../../../server/demo/demo-data.ts';

let top: string;
beforeEach(() => {
  top = mkdtempSync(join(tmpdir(), 'vouchline-test-'));
});
afterEach(() => rmSync(top, { recursive: true, force: true }));

describe('the data directory of a demo', () => {
  it('is made with a plant file that people may change, and taken up again as it is', () => {
    const directory = join(top, 'new');
    const begun = demoData(directory, 7);
    expect(readFileSync(begun.plantFile, 'utf8')).toContain('name: Hose works');
    writeFileSync(begun.plantFile, 'changed');
    expect(demoData(directory, undefined)).toEqual({ directory, plantFile: join(directory, 'plant.yaml'), seed: 7 });
    expect(readFileSync(begun.plantFile, 'utf8')).toBe('changed');
  });

  it('does not go on with another seed', () => {
    demoData(top, undefined);
    expect(demoData(top, 1).seed).toBe(1);
    expect(() => demoData(top, 2)).toThrow(new BadDemoData(`The demo in ${top} was begun with --seed 1; it cannot go on with 2.`));
  });

  it('is never one that holds something else', () => {
    const directory = join(top, 'plant');
    mkdirSync(directory);
    writeFileSync(join(directory, 'vouchline.db'), '');
    expect(() => demoData(directory, undefined)).toThrow(BadDemoData);
  });
});
