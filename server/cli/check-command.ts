import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { Command } from 'commander';
import { checkChain, followChain, type ChainHead, type ChainState } from '../store/change-table.ts';
import { openToRead } from '../store/database.ts';
import { schemaVersionOf } from '../store/migrate.ts';
import { storeErrorOf } from '../store/sqlite-fault.ts';
import { CommandFault, exitCode } from './exit-codes.ts';
import { exportedChain } from './exported-chain.ts';
import { toldSettings, withSettings } from './told-settings.ts';

const examples = `
Examples:
  vouchline check --data /var/lib/vouchline                     also while a server runs on it
  vouchline check --data backup --head 12:9f86d081…             against a head noted elsewhere before
  vouchline check --export changes.ndjson                       an export of the whole record, away from the plant

Note the head it prints outside of the machine now and then: whoever may write the data directory could write the whole
record anew, and only a noted head finds that.

Exit codes: 0 whole, 1 broken, 2 bad input, 3 the data cannot be read.`;

export function checkCommand(): Command {
  const command = withSettings(new Command('check').description('verify that nothing in the record of changes was altered or taken out'), ['data']);
  command.option('--head <number:hash>', 'a head printed earlier, to be found again').option('--export <file>', 'an export of the whole record (NDJSON) in place of a data directory; - for standard input').option('--json', 'print JSON').addHelpText('after', examples);
  return command.action(async () => {
    const { head, json, export: file } = command.opts<{ head?: string; json?: boolean; export?: string }>();
    const noted = head === undefined ? undefined : headOf(head);
    const state = file === undefined ? chainOf(join(toldSettings(command).data, 'vouchline.db'), noted) : followChain(await exportedChain(file), 0, noted);
    process.stdout.write(json === true ? `${JSON.stringify(state)}\n` : `${sentenceOf(state)}\n`);
    if (state.kind === 'broken') process.exitCode = exitCode.foundWrong;
  });
}

function headOf(text: string): ChainHead {
  const [, id, hash] = /^(\d{1,15}):([0-9a-f]{64})$/.exec(text) ?? [];
  if (id === undefined || hash === undefined) throw new CommandFault(`--head: got ${text}; expected a number, a colon and 64 hexadecimal digits, as this command prints them`);
  return { id: Number(id), hash };
}

function chainOf(path: string, noted: ChainHead | undefined): ChainState {
  if (!existsSync(path)) throw new CommandFault(`--data: there is no ${path}; expected the data directory of a server`);
  try {
    const database = openToRead(path);
    try {
      if (schemaVersionOf(database) < 3) throw new CommandFault('--data: written before there was a record of changes; start this version of the server on it once');
      return checkChain(database, noted);
    } finally {
      database.close();
    }
  } catch (cause) {
    if (cause instanceof CommandFault) throw cause;
    throw new CommandFault(storeErrorOf(cause).message, exitCode.failed);
  }
}

function sentenceOf(state: ChainState): string {
  if (state.kind === 'whole') return `The record of changes is whole: ${state.head.id} records, head ${state.head.id}:${state.head.hash}`;
  switch (state.why) {
    case 'missing':
      return `The record of changes is broken at record ${state.at}: it is missing.`;
    case 'altered':
      return `The record of changes is broken at record ${state.at}: it, or its place, is not what was written.`;
    case 'cut-off':
      return `The record of changes is broken at record ${state.at}: it and all that followed are missing.`;
    case 'not-as-noted':
      return `The record of changes is broken at or before record ${state.at}: its hash is not the one noted.`;
  }
}
