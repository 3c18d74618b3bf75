import { Command } from 'commander';
import { AccessBook } from '../access/access-book.ts';
import { Invitations } from '../access/invitations.ts';
import { DamagedAccessItem } from '../access/kept.ts';
import { Passwords } from '../access/passwords.ts';
import { accountNamed } from '../access/sign-in.ts';
import { openStore } from '../store/sqlite-store.ts';
import { StoreError } from '../store/store-error.ts';
import { CommandFault, exitCode } from './exit-codes.ts';
import { toldSettings, withSettings } from './told-settings.ts';

const examples = `
Examples:
  vouchline account list                    who has an account, with which roles
  vouchline account link olaf               a link by which olaf sets a new password, where no administrator can make one

The server on the data directory has to be stopped: it holds the accounts in memory. Whoever may write the data
directory may do this; it is on the record of changes.`;

export function accountCommand(): Command {
  const command = new Command('account').description('accounts of a data directory whose server is stopped: list them, make a link for a new password').addHelpText('after', examples);
  const within = (name: string, description: string): Command => withSettings(command.command(name).description(description), ['data']).option('--json', 'print JSON');

  const list = within('list', 'list the accounts');
  list.action(() => withBook(list, (book) => {
    const accounts = book.accounts.entries().map(([, { name, shownAs, grants, disabled }]) => ({ name, shownAs, grants, disabled }));
    const lines = accounts.map(({ name, shownAs, grants, disabled }) => `${name.padEnd(24)} ${shownAs.padEnd(28)} ${disabled ? 'disabled' : grants.map(({ role, line }) => (line === null ? role : `${role} of ${line}`)).join(', ')}\n`);
    print(list, accounts, lines.length === 0 ? 'No account yet: the next start of the server prints a link for the first one.\n' : lines.join(''));
    return Promise.resolve();
  }));

  const link = within('link <name>', 'make a link by which somebody sets a new password; it holds for a day');
  link.action((name: string) => withBook(link, async (book) => {
    const found = accountNamed(book, name);
    if (found === undefined) throw new CommandFault(`name: no account is called ${JSON.stringify(name)}; expected one of ${book.accounts.entries().map(([, account]) => account.name).join(', ')}`);
    const { code, expires } = await new Invitations(book, new Passwords(), () => '').newPassword('command line', found[0], 'asked for on the command line');
    print(link, { link: `/join#${code}`, expires }, `Start the server, and open its address with /join#${code} within a day.\n`);
  }));
  return command;
}

async function withBook(command: Command, act: (book: AccessBook) => Promise<void>): Promise<void> {
  const { data } = toldSettings(command);
  try {
    const store = await openStore(data);
    try {
      await act(await AccessBook.load(store.access, Date.now));
    } finally {
      await store.close();
    }
  } catch (cause) {
    if (cause instanceof StoreError || cause instanceof DamagedAccessItem) throw new CommandFault(cause.message, exitCode.failed);
    throw cause;
  }
}

function print(command: Command, value: unknown, text: string): void {
  process.stdout.write(command.opts<{ json?: boolean }>().json === true ? `${JSON.stringify(value)}\n` : text);
}
