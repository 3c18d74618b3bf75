import { describe, expect, it } from 'vitest';
import { agentWords } from '../../client/account/agent-words.ts';
import { addressPart, momentOf, wholeRecord } from '../../client/changes/change-query.ts';
import { changeWord, differencesOf } from '../../client/changes/change-words.ts';
import { formatsFor } from '../../client/format.ts';
import { grantsChange } from '../../client/people/grants-change.ts';
import { namesIn, useWords } from '../../client/sources/source-words.ts';
import { changeKinds } from '../../core/access/change.ts';
import type { Grant } from '../../core/access/role.ts';

const lines = [{ id: 'a', name: 'Hose line A' }];
const formats = formatsFor('en-GB', 'Europe/Vienna', 'ppm');

describe('before and after', () => {
  it('tell the parts that differ and leave out the others', () => {
    expect(differencesOf({ shownAs: 'Ines', disabled: false }, { shownAs: 'Ines', disabled: true }, lines)).toEqual([{ name: 'disabled', before: 'no', after: 'yes' }]);
    expect(differencesOf({ grants: [{ role: 'viewer', line: undefined }] }, { grants: [{ role: 'viewer', line: undefined }, { role: 'maintenance', line: 'a' }] }, lines))
      .toEqual([{ name: 'grants', before: 'viewer for the whole plant', after: 'viewer for the whole plant, maintenance for Hose line A' }]);
  });

  it('are told whole where they are one thing, and as given or taken where only one is there', () => {
    expect(differencesOf('unacknowledged', 'acknowledged', lines)).toEqual([{ name: '', before: 'unacknowledged', after: 'acknowledged' }]);
    expect(differencesOf(undefined, 'a new password', lines)).toEqual([{ name: '', before: undefined, after: 'a new password' }]);
    expect(differencesOf({ acting: true, line: 'a' }, undefined, lines)).toEqual([{ name: 'acting', before: 'yes', after: undefined }, { name: 'line', before: 'a', after: undefined }]);
    expect(differencesOf(undefined, undefined, lines)).toEqual([]);
    expect(differencesOf('same', 'same', lines)).toEqual([]);
  });

  it('say times as times and what is deeper in words', () => {
    expect(differencesOf(undefined, { lastUsed: Date.UTC(2026, 2, 3, 8, 12), deep: { aB: [], c: { d: 1 } } }, lines)).toEqual([
      { name: 'last used', before: undefined, after: '2026-03-03 08:12 UTC' },
      { name: 'deep', before: undefined, after: 'aB none, c d 1' },
    ]);
  });

  it('go into the parts of parts, and leave ids as they are', () => {
    const plant = (line: number, more: object = {}): never => ({ version: `v${line}`, guarantees: { 'leak-A': { guaranteeLine: line, window: { kind: 'units', units: 1000 } }, ...more } }) as never;
    expect(differencesOf(plant(0.01), plant(0.005, { fill: { name: 'Fill' } }), lines)).toEqual([
      { name: 'version', before: 'v0.01', after: 'v0.005' },
      { name: 'guarantees, leak-A, guarantee line', before: '0.01', after: '0.005' },
      { name: 'guarantees, fill', before: undefined, after: 'name Fill' },
    ]);
  });

  it('every kind of change has its word, each another', () => {
    expect(new Set(changeKinds.map((kind) => changeWord[kind])).size).toBe(changeKinds.length);
  });
});

describe('what of the record is asked for', () => {
  it('a written moment is the plant’s, on both sides of a change of the clocks', () => {
    expect(momentOf('2026-03-29T01:30', 'Europe/Vienna')).toBe(Date.UTC(2026, 2, 29, 0, 30));
    expect(momentOf('2026-03-29T03:30', 'Europe/Vienna')).toBe(Date.UTC(2026, 2, 29, 1, 30));
    expect(momentOf('2026-07-01T00:00', 'Asia/Kolkata')).toBe(Date.UTC(2026, 5, 30, 18, 30));
    expect(momentOf('', 'Europe/Vienna')).toBeUndefined();
  });

  it('goes into the address without what was left empty, and with every sign kept', () => {
    expect(addressPart(wholeRecord, 'UTC')).toBe('');
    expect(addressPart({ from: '2026-01-01T00:00', to: '', kind: 'sign-in', holds: 'a & b=ä?' }, 'UTC', { limit: 100 })).toBe(`?from=${Date.UTC(2026, 0, 1)}&kind=sign-in&holds=a%20%26%20b%3D%C3%A4%3F&limit=100`);
  });
});

describe('a change of roles', () => {
  const [viewer, mender]: Grant[] = [{ role: 'viewer', line: undefined }, { role: 'maintenance', line: 'a' }];

  it('says what it gives and what it takes', () => {
    expect(grantsChange([viewer!], [viewer!, mender!], lines)).toBe('Gives maintenance for Hose line A.');
    expect(grantsChange([viewer!, mender!], [mender!], lines)).toBe('Takes viewer for the whole plant.');
    expect(grantsChange([viewer!], [mender!], lines)).toBe('Gives maintenance for Hose line A. Takes viewer for the whole plant.');
    expect(grantsChange([viewer!, mender!], [mender!, viewer!], lines)).toBe('');
  });
});

describe('what a browser calls itself', () => {
  it.each([
    ['Mozilla/5.0 (X11; Linux x86_64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/126.0 Safari/537.36', 'Chrome on Linux'],
    ['Mozilla/5.0 (Windows NT 10.0) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/126.0 Safari/537.36 Edg/126.0', 'Edge on Windows'],
    ['Mozilla/5.0 (iPhone; CPU iPhone OS 17_5 like Mac OS X) AppleWebKit/605.1 (KHTML, like Gecko) Version/17.5 Mobile Safari/604.1', 'Safari on iPhone'],
    ['Mozilla/5.0 (Android 14; Mobile; rv:127.0) Gecko/127.0 Firefox/127.0', 'Firefox on Android'],
    ['', 'Unknown program'],
  ])('%s', (agent, words) => {
    expect(agentWords(agent)).toBe(words);
  });

  it('what is not known stays as it was said, cut', () => {
    expect(agentWords('x'.repeat(400))).toBe('x'.repeat(60));
  });
});

describe('sources', () => {
  it('names are read with commas or blanks between them, each once', () => {
    expect(namesIn(' A.leak-test, B.leak-test;A.leak-test\n*')).toEqual(['A.leak-test', 'B.leak-test', '*']);
    expect(namesIn(' , ')).toEqual([]);
  });

  it('say when they were used and until when an old token holds', () => {
    const at = Date.UTC(2026, 2, 3, 8, 12);
    const source = { id: 's', name: 's', stations: [], products: undefined, made: at, lastUsed: undefined, revoked: undefined, oldTokenUntil: undefined, connected: false };
    expect(useWords(source, formats, at)).toBe('Never used, made 3 Mar 2026.');
    expect(useWords({ ...source, lastUsed: at, revoked: at, oldTokenUntil: at + 1 }, formats, at)).toBe('Last used 3 Mar, 09:12, made 3 Mar 2026. Withdrawn 3 Mar, 09:12.');
    expect(useWords({ ...source, oldTokenUntil: at + 60_000 }, formats, at)).toBe('Never used, made 3 Mar 2026. The old token holds until 3 Mar, 09:13.');
    expect(useWords({ ...source, oldTokenUntil: at - 1 }, formats, at)).toBe('Never used, made 3 Mar 2026.');
  });
});
