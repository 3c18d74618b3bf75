import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Command } from 'commander';
import type { ClockSetting } from '../clock/plant-clock.ts';
import { logOf } from '../ops/log.ts';
import { BadPlantFile, serve } from '../serve.ts';
import { DamagedAccessItem } from '../access/kept.ts';
import { BadSetting, type Settings } from '../settings/settings.ts';
import { StoreError } from '../store/store-error.ts';
import { CommandFault, exitCode } from './exit-codes.ts';
import { toldSettings, withSettings } from './told-settings.ts';
import { untilToldToStop } from './until-told.ts';

const examples = `
Examples:
  vouchline serve                                 on this machine only, data in ./.data
  vouchline serve --data /var/lib/vouchline --plant /etc/vouchline/plant.yaml
  vouchline serve --reload                        tells the server on this data directory to read its plant file anew
  VOUCHLINE_PORT=8080 vouchline serve             every flag is also a variable

Signals: SIGHUP reads the plant file anew; SIGTERM and SIGINT stop in order.
Exit codes: 0 stopped as told, 2 unusable settings or plant file, 3 the store cannot be opened.`;

export function serveCommand(): Command {
  const command = new Command('serve').description('run the server: sources on /source, dashboards on /, one data directory');
  withSettings(command).option('--reload', 'do not start; tell the running server on this data directory to read its plant file anew').addHelpText('after', examples);
  return command.action(async () => {
    const settings = toldSettings(command);
    if (command.opts<{ reload?: boolean }>().reload === true) return askToReload(settings);
    const clock = clockOf(settings.clock);
    beginPlantFile(settings);
    const served = await started(() => serve({ settings, clock, demo: false, log: logOf(settings.logLevel) }));
    writeFileSync(processFile(settings), String(process.pid));
    process.on('SIGHUP', () => void served.reload());
    process.stdout.write(`Vouchline is at ${served.address}\n`);
    if (served.firstLink !== undefined) process.stdout.write(`Make the first account, an administrator, within a day: ${served.firstLink}\n`);
    await served.stop(await untilToldToStop());
  });
}

/** Runs a start and turns its foreseen failures into sentences with an exit code. */
export async function started<T>(start: () => Promise<T>): Promise<T> {
  try {
    return await start();
  } catch (cause) {
    if (cause instanceof BadPlantFile || cause instanceof BadSetting) throw new CommandFault(cause.message);
    if (cause instanceof DamagedAccessItem) throw new CommandFault(cause.message, exitCode.failed);
    if (cause instanceof StoreError) throw new CommandFault(cause.message, exitCode.failed);
    if ((cause as NodeJS.ErrnoException).code === 'EADDRINUSE') throw new CommandFault(`The port is taken already; choose another with --port. (${(cause as Error).message})`, exitCode.failed);
    throw cause;
  }
}

function clockOf(text: string): ClockSetting {
  if (text === 'wall' || text === 'records') return { kind: text };
  throw new CommandFault(`--clock: ${JSON.stringify(text)}; expected wall or records`);
}

const processFile = (settings: Settings): string => join(settings.data, 'server.pid');

/** A first start has no plant yet: it begins with an empty one, which says how to go on. */
function beginPlantFile(settings: Settings): void {
  const path = join(settings.data, 'plant.yaml');
  if (settings.plant !== undefined || existsSync(path)) return;
  mkdirSync(settings.data, { recursive: true, mode: 0o700 });
  writeFileSync(path, starterPlant, { flag: 'wx' });
  process.stderr.write(`Began with an empty plant file: ${path}\n`);
}

const starterPlant = `# The plant file: lines, stations, products, and what is guaranteed of them.
# 'vouchline plant schema' prints what can stand here; 'vouchline plant check FILE' checks a file.
# After a change: 'vouchline serve --reload'.
vouchline: 1
plant:
  name: New plant
  time-zone: UTC
lines: []
products: []
guarantees: []
`;

function askToReload(settings: Settings): void {
  let pid: number;
  try {
    pid = Number(readFileSync(processFile(settings), 'utf8'));
    process.kill(pid, 'SIGHUP');
  } catch {
    throw new CommandFault(`No server runs on the data directory ${settings.data}.`, exitCode.failed);
  }
  process.stdout.write(`Told the server (process ${pid}) to read its plant file anew; its log says whether it is in force.\n`);
}
