import * as v from 'valibot';
import { canonicalJson, type Json } from '../../core/access/canonical-json.ts';
import type { ChainedRow } from '../store/change-table.ts';
import { CommandFault } from './exit-codes.ts';
import { textOfFile } from './text-of-file.ts';

const exported = v.looseObject({ id: v.pipe(v.number(), v.safeInteger(), v.minValue(1)), hash: v.pipe(v.string(), v.regex(/^[0-9a-f]{64}$/)) });

/** Records of an export in NDJSON, by rising number, each with the text that was hashed. @throws CommandFault naming the line */
export async function exportedChain(path: string): Promise<readonly ChainedRow[]> {
  const { pieces } = await textOfFile(path);
  const read: Uint8Array[] = [];
  for (let piece = await pieces.next(); piece.done !== true; piece = await pieces.next()) read.push(piece.value);
  const lines = Buffer.concat(read).toString('utf8').split('\n');
  const rows = lines.flatMap((line, index) => (line.trim() === '' ? [] : [rowOf(line, index + 1)]));
  return rows.sort((a, b) => a.id - b.id);
}

function rowOf(line: string, number: number): ChainedRow {
  const { success, output } = v.safeParse(v.pipe(v.string(), v.parseJson(), exported), line);
  if (!success) throw new CommandFault(`--export: line ${number} is ${JSON.stringify(line.slice(0, 60))}; expected a record of an export in NDJSON, with its number and hash`);
  const { hash, ...body } = output;
  return { id: output.id, body: canonicalJson(body as unknown as Json), hash: Buffer.from(hash, 'hex') };
}
