import { Command, InvalidArgumentError, Option } from 'commander';
import { openRegisterFile } from '../store/register-file.ts';
import type { Source, SourceRegister } from '../store/source-register.ts';
import { StoreError } from '../store/store-error.ts';
import { CommandFault, exitCode } from './exit-codes.ts';
import { toldSettings, withSettings } from './told-settings.ts';

const examples = `
Examples:
  vouchline source add leak-tester-A --station A.leak-test      prints the token, once
  vouchline source add gateway --station '*'                    a source for the whole plant
  vouchline source list --json
  vouchline source rotate leak-tester-A                         a new token; the old one is refused from now on
  vouchline source rotate leak-tester-A --overlap 24            the old one is taken for a day beside it
  vouchline source add filler --station K.filling --product FK-250
  vouchline source revoke leak-tester-A

Only a hash of each token is kept. The commands work while a server runs on the same data
directory: it ends connections by a token that is not taken any more within a second.`;

export function sourceCommand(): Command {
  const command = new Command('source').description('who may send records: make, list, renew and withdraw tokens').addHelpText('after', examples);
  const within = (name: string, description: string): Command => withSettings(command.command(name).description(description), ['data']).option('--json', 'print JSON');

  const add = within('add <name>', 'make a source and print its token').requiredOption('--station <id...>', "stations it may send for; '*' for every station").option('--product <id...>', 'products it may send for; every product when absent');
  add.action(async (name: string) => {
    const { station, product } = add.opts<{ station: string[]; product?: string[] }>();
    await withRegister(add, async (register) => {
      const { source, token } = await register.add({ name, stations: station, products: product, at: Date.now() });
      print(add, { source: shown(source), token }, `${token}\n`);
    });
  });

  const list = within('list', 'list the sources');
  list.action(() => withRegister(list, async (register) => {
    const sources = await register.list();
    print(list, sources.map(shown), sources.length === 0 ? 'No source yet. Make one: vouchline source add NAME --station STATION\n' : sources.map(lineOf).join(''));
  }));

  const rotate = within('rotate <name>', 'give a source a new token').addOption(new Option('--overlap <hours>', 'hours for which the old token is taken, too; 0 refuses it at once').default(0).argParser(hoursOf));
  rotate.action((name: string) => withRegister(rotate, async (register) => {
    const { overlap } = rotate.opts<{ overlap: number }>();
    const { source, token } = await register.rotate({ name, oldUntil: overlap === 0 ? undefined : Date.now() + overlap * 3_600_000 });
    print(rotate, { source: shown(source), token }, `${token}\n`);
  }));

  const revoke = within('revoke <name>', "withdraw a source's token");
  revoke.action((name: string) => withRegister(revoke, async (register) => {
    print(revoke, shown(await register.revoke(name, Date.now())), `The token of ${name} is no longer taken.\n`);
  }));
  return command;
}

async function withRegister(command: Command, act: (register: SourceRegister) => Promise<void>): Promise<void> {
  const { data } = toldSettings(command);
  try {
    const register = openRegisterFile(data);
    try {
      await act(register);
    } finally {
      register.close();
    }
  } catch (cause) {
    if (cause instanceof StoreError) throw new CommandFault(cause.message, cause.fault === 'input-output' ? exitCode.failed : exitCode.badInput);
    throw cause;
  }
}

const time = (ms: number | undefined): string | undefined => (ms === undefined ? undefined : new Date(ms).toISOString());

const shown = ({ name, stations, products, created, lastUsed, revoked, oldUntil }: Source): object => ({
  name, stations, products, created: time(created), lastUsed: time(lastUsed), revoked: time(revoked), oldTokenUntil: time(oldUntil),
});

function hoursOf(text: string): number {
  const hours = Number(text);
  if (!(hours >= 0 && hours <= 720)) throw new InvalidArgumentError('Expected hours, 0 to 720.');
  return hours;
}

const lineOf = ({ name, stations, lastUsed, revoked }: Source): string =>
  `${name.padEnd(24)} ${stations.join(', ').padEnd(32)} ${revoked === undefined ? `last used ${time(lastUsed) ?? 'never'}` : `revoked ${time(revoked) ?? ''}`}\n`;

function print(command: Command, value: unknown, text: string): void {
  process.stdout.write(command.opts<{ json?: boolean }>().json === true ? `${JSON.stringify(value)}\n` : text);
}
