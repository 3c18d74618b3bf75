#!/usr/bin/env node
import { Command } from 'commander';
import { demoCommand } from './demo-command.ts';
import { CommandFault, exitCode } from './exit-codes.ts';
import { feedCommand } from './feed-command.ts';
import { endWithOutput } from './output-ends.ts';
import { plantCommand } from './plant-command.ts';
import { replayCommand } from './replay-command.ts';
import { serveCommand } from './serve-command.ts';
import { sourceCommand } from './source-command.ts';

const program = new Command('vouchline')
  .description('Tells a plant, while it runs, whether it can still vouch for what it promised.')
  .addCommand(serveCommand())
  .addCommand(demoCommand())
  .addCommand(sourceCommand())
  .addCommand(feedCommand())
  .addCommand(replayCommand())
  .addCommand(plantCommand())
  .showHelpAfterError('(vouchline --help and vouchline COMMAND --help say what can be given)')
  .configureOutput({ outputError: (text, write) => write(text) })
  .exitOverride((error) => {
    process.exitCode = error.exitCode === 0 ? exitCode.done : exitCode.badInput;
    throw error;
  });

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
