#!/usr/bin/env node
import { Command } from 'commander';
import { CommandFault, exitCode } from './exit-codes.ts';
import { endWithOutput } from './output-ends.ts';

/** Each command's code is loaded when it is asked for: a bound does not wait for the server's. In the order of the help. */
const commands: Readonly<Record<string, () => Promise<Command>>> = {
  serve: async () => (await import('./serve-command.ts')).serveCommand(),
  demo: async () => (await import('./demo-command.ts')).demoCommand(),
  source: async () => (await import('./source-command.ts')).sourceCommand(),
  account: async () => (await import('./account-command.ts')).accountCommand(),
  feed: async () => (await import('./feed-command.ts')).feedCommand(),
  replay: async () => (await import('./replay-command.ts')).replayCommand(),
  plant: async () => (await import('./plant-command.ts')).plantCommand(),
  check: async () => (await import('./check-command.ts')).checkCommand(),
  bound: async () => (await import('./bound-command.ts')).boundCommand(),
  plan: async () => (await import('./plan-command.ts')).planCommand(),
};

const program = new Command('vouchline').description('Tells a plant, while it runs, whether it can still vouch for what it promised.');
const asked = process.argv[2] ?? '';
for (const load of Object.hasOwn(commands, asked) ? [commands[asked]] : Object.values(commands)) {
  if (load !== undefined) program.addCommand(await load());
}
endTheHouseWay(program);

/** Commands that were made elsewhere do not inherit how the program complains and ends. */
function endTheHouseWay(command: Command): void {
  command
    .showHelpAfterError('(vouchline --help and vouchline COMMAND --help say what can be given)')
    .configureOutput({ outputError: (text, write) => write(text) })
    .exitOverride((error) => {
      process.exitCode = error.exitCode === 0 ? exitCode.done : exitCode.badInput;
      throw error;
    });
  command.commands.forEach(endTheHouseWay);
}

endWithOutput();
try {
  await program.parseAsync();
} catch (cause) {
  if (cause instanceof CommandFault) {
    process.stderr.write(`${cause.message}\n`);
    process.exitCode = cause.code;
  } else if (!(cause instanceof Error && 'exitCode' in cause)) {
    process.stderr.write(`${cause instanceof Error ? (cause.stack ?? cause.message) : String(cause)}\n`);
    process.exitCode = exitCode.failed;
  }
}
