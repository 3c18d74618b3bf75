import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Command, InvalidArgumentError, Option } from 'commander';
import { BadDemoData, demoData } from '../demo/demo-data.ts';
import { runDemo, type DemoSetting } from '../demo/run-demo.ts';
import { logOf, type LogLevel } from '../ops/log.ts';
import { CommandFault } from './exit-codes.ts';
import { started } from './serve-command.ts';
import { toldSettings, withSettings } from './told-settings.ts';
import { untilToldToStop } from './until-told.ts';

const examples = `
A plant that makes brake hoses for cargo bikes, all invented, lives on the real server: its stations send their
records over the network like any source. A second of yours is a minute of the plant. Within two minutes a bound
crosses its guarantee line; acknowledge the alarm in the browser and see it return to normal after the repair.

Examples:
  vouchline demo                           a new plant each time, its data under a temporary folder, gone at the end
  vouchline demo --data ./demo             keeps its data; the same command goes on where the plant stood
  vouchline demo --rate 300                a day of the plant in five minutes
  vouchline demo --seed 7                  other days; the same seed tells the same ones again
  vouchline demo --host 0.0.0.0 --port 80  for a screen across the hall

The plant file is plant.yaml in the data directory; SIGHUP reads it anew. Ctrl-C ends everything in order.
Exit codes: 0 stopped as told, 2 unusable settings or data directory, 3 something outside failed.`;

/** Faster, a hiccup of the machine would look like a silent station. */
const mostRate = 300;

interface DemoOptions {
  readonly data?: string;
  readonly rate: number;
  readonly seed?: number;
  readonly logLevel: LogLevel;
}

const wholeFrom = (from: number, to: number) => (text: string): number => {
  const value = Number(text);
  if (!/^\d+$/.test(text) || value < from || value > to) throw new InvalidArgumentError(`Expected a whole number from ${from} to ${to}.`);
  return value;
};

export function demoCommand(): Command {
  const command = new Command('demo').description('run the server with an invented plant that lives through a day in minutes');
  withSettings(command, ['host', 'port', 'dashboards']);
  command
    .option('--data <dir>', 'keep the data in this directory, and go on from what is there; a temporary one when absent')
    .addOption(new Option('--rate <number>', `plant seconds a second, 1 to ${mostRate}`).default(60).argParser(wholeFrom(1, mostRate)))
    .addOption(new Option('--seed <number>', 'what the days are made from [default: 1]').argParser(wholeFrom(0, 4_294_967_295)))
    .addOption(new Option('--log-level <level>', 'least severe entries to log').choices(['debug', 'info', 'warn', 'error', 'silent']).default('warn'))
    .addHelpText('after', examples);
  return command.action(async () => {
    const options = command.opts<DemoOptions>();
    const directory = options.data ?? mkdtempSync(join(tmpdir(), 'vouchline-demo-'));
    try {
      await live({ settings: toldSettings(command), data: dataOf(directory, options.seed), rate: options.rate, log: logOf(options.logLevel) });
    } finally {
      if (options.data === undefined) rmSync(directory, { recursive: true, force: true });
    }
  });
}

async function live(setting: DemoSetting): Promise<void> {
  const told = untilToldToStop();
  const demo = await started(() => runDemo(setting));
  const reload = (): void => void demo.served.reload();
  process.on('SIGHUP', reload);
  process.stdout.write(`The demo plant is at ${demo.served.address}\n`);
  try {
    await demo.stop(await Promise.race([told, demo.failed]));
  } catch (cause) {
    await demo.stop('the demo plant failed');
    throw cause;
  } finally {
    process.off('SIGHUP', reload);
  }
}

function dataOf(directory: string, seed: number | undefined): DemoSetting['data'] {
  try {
    return demoData(directory, seed);
  } catch (cause) {
    if (cause instanceof BadDemoData) throw new CommandFault(cause.message);
    throw cause;
  }
}
