import { createReadStream } from 'node:fs';
import { open } from 'node:fs/promises';
import type { Readable } from 'node:stream';
import { CommandFault } from './exit-codes.ts';

/** A file (or standard input, for '-') piece by piece. */
export interface TextOfFile {
  readonly pieces: AsyncIterator<Uint8Array>;
  /** Bytes in all; undefined where that is not known. */
  readonly bytes: number | undefined;
  /** Bytes handed out so far. */
  readonly read: () => number;
  /** Nothing more is wanted: lets go of the file. */
  readonly close: () => void;
}

/** @throws CommandFault for a file that cannot be opened */
export async function textOfFile(path: string): Promise<TextOfFile> {
  if (path === '-') return counted(process.stdin, undefined);
  try {
    const file = await open(path);
    const stat = await file.stat();
    if (stat.isDirectory()) throw new Error('it is a directory');
    return counted(createReadStream('', { fd: file }), stat.isFile() ? stat.size : undefined);
  } catch (cause) {
    throw new CommandFault(`The file ${path} cannot be read: ${(cause as Error).message}`);
  }
}

function counted(stream: Readable, bytes: number | undefined): TextOfFile {
  let read = 0;
  async function* pieces(): AsyncGenerator<Uint8Array, void, undefined> {
    for await (const piece of stream as AsyncIterable<Buffer>) {
      read += piece.length;
      yield piece;
    }
  }
  return { pieces: pieces(), bytes, read: () => read, close: () => stream.destroy() };
}
