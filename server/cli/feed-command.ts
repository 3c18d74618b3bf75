import { Command } from 'commander';
import { sourceLimits } from '../../core/protocol/limits.ts';
import { Feed, type FeedSums } from '../feed/feed.ts';
import { FeedProgress } from '../feed/feed-progress.ts';
import { SourceFailure } from '../feed/source-failure.ts';
import { CommandFault, exitCode } from './exit-codes.ts';
import { textOfFile } from './text-of-file.ts';
import { wholeOption } from './whole-option.ts';

const examples = `
FILE holds rows as CSV (its first line names the columns) or NDJSON; which of them is told by its first character.
Rows without a sequence are numbered on from what the server has. Should the run break off, give the same file again
with --first and the sequence printed: nothing is then counted twice. Rows with a sequence need no such care.

Examples:
  vouchline feed week-23.csv --to ws://127.0.0.1:7317 --token "$(cat leak-tester-A.token)"
  VOUCHLINE_TOKEN=… vouchline feed week-23.csv          to the server on this machine
  tail -F tester.ndjson | vouchline feed -               rows as they are written
  vouchline feed week-23.csv --first 40961               the same file on, after a break

Exit codes: 0 everything is on the server's disk, 1 the same, but some records are set aside (kept, not counted),
2 unusable row, option, token or address, 3 the server could not be reached for too long, or the run was told to stop.`;

interface FeedOptions {
  readonly to: string;
  readonly token?: string;
  readonly first?: string;
  readonly giveUpAfter: string;
  readonly frameRecords: string;
  readonly quiet?: boolean;
  readonly json?: boolean;
}

export function feedCommand(): Command {
  return new Command('feed')
    .description('send a file of rows, or rows as they come, to a server')
    .argument('<file>', "rows as CSV or NDJSON; '-' reads standard input")
    .option('--to <address>', 'the server: ws://host:port or wss://host:port [VOUCHLINE_TO]', process.env['VOUCHLINE_TO'] ?? 'ws://127.0.0.1:7317')
    .option('--token <text>', "the source's token; better given as VOUCHLINE_TOKEN, which other users of the machine cannot see")
    .option('--first <sequence>', 'sequence of the first row, as an interrupted run printed it')
    .option('--give-up-after <seconds>', 'end when nothing got through for so long', '300')
    .option('--frame-records <number>', 'records of a frame at most', '5000')
    .option('--quiet', 'no progress on standard error')
    .option('--json', 'print the summary as JSON')
    .addHelpText('after', examples)
    .action(runFeed);
}

async function runFeed(file: string, options: FeedOptions): Promise<void> {
  const feed = new Feed({
    address: addressOf(options.to),
    token: tokenOf(options.token),
    first: options.first === undefined ? undefined : wholeOption('--first', options.first, 1, Number.MAX_SAFE_INTEGER),
    giveUpMs: wholeOption('--give-up-after', options.giveUpAfter, 1, 31_536_000) * 1_000,
    frameRecords: wholeOption('--frame-records', options.frameRecords, 1, sourceLimits.records),
  });
  const text = await textOfFile(file);
  const progress = options.quiet === true ? undefined : new FeedProgress(process.stderr, text, feed);
  const stop = (): void => feed.stop();
  process.once('SIGINT', stop).once('SIGTERM', stop);
  try {
    await feed.run(text.pieces);
  } catch (cause) {
    throw faultOf(cause, file, feed.sums);
  } finally {
    text.close();
    progress?.end();
    process.off('SIGINT', stop).off('SIGTERM', stop);
    print(feed.sums, options.json === true);
  }
  if (feed.sums.setAside > 0) process.exitCode = exitCode.foundWrong;
}

function addressOf(text: string): URL {
  const address = URL.canParse(text) ? new URL(text) : undefined;
  if (address !== undefined && (address.protocol === 'ws:' || address.protocol === 'wss:') && address.username === '' && address.hash === '') return address;
  throw new CommandFault(`--to: ${JSON.stringify(text)}; expected ws://host:port or wss://host:port`);
}

function tokenOf(told: string | undefined): string {
  const token = told ?? process.env['VOUCHLINE_TOKEN'] ?? '';
  if (token === '') throw new CommandFault('No token: give it as VOUCHLINE_TOKEN or --token. A token is made with: vouchline source add NAME --station STATION');
  if (/^[\x21-\x7e]{1,512}$/.test(token)) return token;
  throw new CommandFault('--token: what was given is no token; expected 1 to 512 visible characters without spaces');
}

/** What went wrong, and how to go on from there. */
function faultOf(cause: unknown, file: string, sums: FeedSums): unknown {
  if (!(cause instanceof SourceFailure)) return cause;
  const place = cause.line === undefined ? '' : `${file === '-' ? 'standard input' : file}:${cause.line}: `;
  const goOn = cause.kind !== 'refused' && sums.numbered && sums.first !== undefined ? `\nTo go on: the same file again, with --first ${sums.first}` : '';
  const outside = cause.kind === 'gave-up' || cause.kind === 'closed';
  return new CommandFault(`${place}${cause.message}${goOn}`, outside ? exitCode.failed : exitCode.badInput);
}

function print(sums: FeedSums, json: boolean): void {
  if (json) {
    process.stdout.write(`${JSON.stringify(sums)}\n`);
    return;
  }
  for (const { sequence, records, code, sentence } of sums.listed) process.stderr.write(`Set aside: ${records} from sequence ${sequence}: ${sentence} (${code})\n`);
  const { source, first, next, sent, repeated, setAside, seconds } = sums;
  if (source === undefined) return;
  const rows = `${sent} records sent, ${repeated} known already, ${setAside} set aside, in ${seconds.toFixed(1)} s`;
  process.stdout.write(`${source}: ${rows}; first sequence ${first ?? 'none'}, everything below ${next} is on the server's disk\n`);
}
