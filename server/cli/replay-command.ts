import { once } from 'node:events';
import { basename } from 'node:path';
import { Command } from 'commander';
import type { Decisions } from '../../core/monitor/monitor.ts';
import { sourceLimits } from '../../core/protocol/limits.ts';
import { plantFile } from '../plant-file.ts';
import { Replay } from '../replay/replay.ts';
import { framesOfRows, type RowsOutcome } from '../rows/frames-of-rows.ts';
import { CommandFault } from './exit-codes.ts';
import { refusalText } from './refusal-text.ts';
import { textOfFile } from './text-of-file.ts';
import { wholeOption } from './whole-option.ts';

const examples = `
FILE holds rows, as CSV or NDJSON ('-': standard input). Each line printed is one happening as JSON, in the order in
which it was decided: evidence, alarm, line, set-aside. A server started with '--clock records' decides the same of the
same rows. With --minutes, closed minutes come after the happenings of their frame, as {"kind":"minute", …}.

Examples:
  vouchline replay --plant plant.yaml week-23.csv
  vouchline replay --plant plant.yaml week-23.csv | grep '"kind":"alarm"'
  gzip -dc week-23.ndjson.gz | vouchline replay --plant plant.yaml --source leak-tester-A -

Exit codes: 0 the whole file went through, 2 unusable plant file, option or row (named by its line; what came before it
is printed), 3 the file or the output failed.`;

interface ReplayOptions {
  readonly plant: string;
  readonly source?: string;
  readonly minutes?: boolean;
  readonly frameRecords: string;
}

export function replayCommand(): Command {
  return new Command('replay')
    .description('run a file of rows through a plant file without a server and print what would have happened')
    .argument('<file>', "rows as CSV or NDJSON; '-' reads standard input")
    .requiredOption('--plant <file>', 'plant file (YAML or JSON)')
    .option('--source <name>', "name of the rows' source in what is printed; the file's name when absent")
    .option('--minutes', 'print closed minutes too')
    .option('--frame-records <number>', 'records of a frame at most; decides nothing', '5000')
    .addHelpText('after', examples)
    .action(async (file: string, options: ReplayOptions) => {
      const records = wholeOption('--frame-records', options.frameRecords, 1, sourceLimits.records);
      const read = await plantFile(options.plant);
      if (!read.ok) throw new CommandFault(read.fault.join('\n'));
      const { plant, version } = read.value;
      const replay = new Replay(plant, version, sourceName(options.source, file));
      await run(file, replay, records, options.minutes === true);
      summarise(replay);
    });
}

function sourceName(told: string | undefined, file: string): string {
  const name = told ?? (file === '-' ? 'standard-input' : basename(file).replace(/\.[^.]*$/, ''));
  if (/^[A-Za-z0-9._-]{1,64}$/.test(name)) return name;
  throw new CommandFault(`--source: ${JSON.stringify(name)}; expected 1 to 64 letters, digits, points, underscores or hyphens`);
}

async function run(file: string, replay: Replay, records: number, minutes: boolean): Promise<void> {
  const text = await textOfFile(file);
  const begin = (first: number): number => {
    replay.begin(first);
    return first;
  };
  const { rowBytes, parts } = sourceLimits;
  const frames = framesOfRows(text.pieces, { form: undefined, rowBytes, records, parts, idleMs: 1_000, begin: ({ sequence }) => begin(sequence ?? 1) });
  try {
    for await (const one of frames) await take(one, replay, file, minutes);
  } finally {
    text.close();
  }
}

async function take(one: RowsOutcome, replay: Replay, file: string, minutes: boolean): Promise<void> {
  if (one.kind === 'refused') throw new CommandFault(refusalText(file, one.refusal));
  const decided = replay.take(one.frame);
  if ('expected' in decided) throw new CommandFault(`${file}:${one.line}: sequence is ${one.frame.first}; expected ${decided.expected}, or a lost row that spends those between.`);
  await print(decided, minutes);
}

async function print({ happenings, minutes }: Decisions, withMinutes: boolean): Promise<void> {
  let text = '';
  for (const happening of happenings) text += `${JSON.stringify(happening)}\n`;
  if (withMinutes) for (const minute of minutes) text += `${JSON.stringify({ kind: 'minute', ...minute })}\n`;
  if (text !== '' && !process.stdout.write(text)) await once(process.stdout, 'drain');
}

function summarise({ monitor, sums }: Replay): void {
  const { records, repeated, setAside } = sums;
  process.stderr.write(`${records} records, ${repeated} of them repeated, ${setAside} set aside; the plant clock stands at ${new Date(monitor.now).toISOString()}\n`);
  for (const { guarantee, standing } of monitor.watches) process.stderr.write(`  ${guarantee.id.padEnd(24)} ${standing.state}\n`);
  process.stderr.write(`${monitor.desk.standing().length} alarms stand\n`);
}
