import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { HappeningFound } from '../../../server/store/store.ts';
import { endAll, getJson, ServerProcess } from '../../faults/harness.ts';
import { vouchline } from '../cli/run-vouchline.ts';
import { dataDirectory, tokenFor } from '../serving.ts';
import { everyQuantity } from './plant.ts';
import { rowFiles } from './row-files.ts';

const folder = mkdtempSync(join(tmpdir(), 'vouchline-rows-'));
const plant = join(folder, 'plant.yaml');
const pathOf = (name: string): string => join(folder, name);

beforeAll(() => {
  writeFileSync(plant, everyQuantity);
  for (const { name, text } of rowFiles) writeFileSync(pathOf(name), text);
});
afterEach(endAll);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function replayed(name: string, ...more: readonly string[]): Promise<string[]> {
  const { code, out, err } = await vouchline(['replay', '--plant', plant, '--source', 'tester', ...more, pathOf(name)]);
  expect(code, err).toBe(0);
  return out.trimEnd().split('\n');
}

/** What a real server decides of a file that is fed to it. */
async function served(name: string, frameRecords: number): Promise<{ readonly events: string[]; readonly sums: { readonly sent: number; readonly repeated: number } }> {
  const data = dataDirectory(everyQuantity);
  try {
    const token = await tokenFor(data.path, 'tester', ['*']);
    const server = ServerProcess.start(data.path);
    const address = await server.address;
    const { code, out, err } = await vouchline(
      ['feed', pathOf(name), '--to', address.replace('http', 'ws'), '--frame-records', String(frameRecords), '--json'],
      { VOUCHLINE_TOKEN: token },
    );
    expect([0, 1], err).toContain(code);
    const events = await everyEvent(address);
    server.signal('SIGTERM');
    await server.ended;
    return { events, sums: JSON.parse(out) as { sent: number; repeated: number } };
  } finally {
    data.remove();
  }
}

async function everyEvent(address: string): Promise<string[]> {
  const found: HappeningFound[] = [];
  for (;;) {
    const before = found.at(-1)?.id;
    const page = await getJson<HappeningFound[]>(`${address}/api/events?limit=1000${before === undefined ? '' : `&before=${before}`}`);
    found.push(...page);
    if (page.length < 1000) return found.reverse().map(({ happening }) => JSON.stringify(happening));
  }
}

describe.each(rowFiles)('$name', { timeout: 120_000 }, ({ name, text, kinds }) => {
  it('is decided the same by a server that is fed it and by a replay, line by line, in frames of any size', async () => {
    const lines = await replayed(name);
    const seen = new Set(lines.map((line) => (JSON.parse(line) as { kind: string }).kind));
    expect([...seen].sort()).toEqual([...kinds].sort());
    for (const frameRecords of [5_000, 7]) {
      const { events, sums } = await served(name, frameRecords);
      expect(events).toEqual(lines);
      expect(sums.repeated).toBe(0);
      expect(sums.sent).toBeGreaterThanOrEqual(text.trimEnd().split('\n').length - 1);
    }
  });

  it('is decided the same in frames of any size, closed minutes included', async () => {
    const [happenings, minutes] = apart(await replayed(name, '--minutes'));
    expect(minutes.length).toBeGreaterThan(100);
    for (const frameRecords of ['1', '64']) expect(apart(await replayed(name, '--minutes', '--frame-records', frameRecords))).toEqual([happenings, minutes]);
  });
});

/** Happenings and minutes; each are in order, but how the two mix depends on the frames. */
function apart(lines: readonly string[]): readonly [readonly string[], readonly string[]] {
  const isMinute = (line: string): boolean => line.startsWith('{"kind":"minute"');
  return [lines.filter((line) => !isMinute(line)), lines.filter(isMinute)];
}
