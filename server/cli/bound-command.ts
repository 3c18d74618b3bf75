import { pipeline } from 'node:stream/promises';
import { Command, Option } from 'commander';
import { askedAttributes } from '../bound/asked-attributes.ts';
import { askedMeasurements } from '../bound/asked-measurements.ts';
import type { AskedQuantity } from '../bound/asked-quantity.ts';
import { answerFor } from '../bound/answer-for.ts';
import { answersOf } from '../bound/batch-lines.ts';
import { boundJson, boundText } from '../bound/bound-text.ts';
import type { Field } from '../bound/quantity.ts';
import { quantities } from '../bound/quantities.ts';
import { flagOf, type Told } from '../bound/told.ts';
import { CommandFault, exitCode } from './exit-codes.ts';

const examples = `
Examples:
  vouchline bound nonconforming-fraction --n 20000 --nonconforming 1 --confidence '95 %' --line '200 ppm'
  vouchline bound yield --n 5000 --nonconforming 41 --confidence 0.95
  vouchline bound rate --count 3 --exposure 1200 --unit m --confidence '99 %'
  vouchline bound mean --csv fill.csv --column volume --side lower --confidence '95 %' --unit ml
  vouchline bound fraction-beyond-limit --csv pull-off.csv --column force --lsl 1800 --confidence '95 %'
  vouchline bound chained-yield --station crimp=3/12000 --station leak=1/11997 --confidence '95 %'
  vouchline bound nonconforming-fraction --n 20000 --nonconforming 1 --confidence '95 %' --looks all --line '200 ppm'
  vouchline bound --batch < requests.ndjson > answers.ndjson

Upper bounds are printed rounded up, lower ones rounded down; --json and --batch give every digit.
Exact bounds are computed a second time by another library, as far as that one is good for it.
Exit codes: 0 answered, 1 the measurements speak against the model that was asked for (or two computations disagree), 2 unusable options or column.`;

const batchHelp = `
Batch: one JSON request a line on standard input, one JSON answer a line in the same order, e.g.
  {"quantity":"nonconforming-fraction","n":20000,"nonconforming":1,"confidence":0.95,"side":"upper"}
  {"bound":0.00023717102659408986}
A request that cannot be met is answered with "error" (and "field"); the others go on. Every request has a quantity
and a confidence (or its complement as tail: 1e-6 rather than 0.999999 where digits matter), and further:
${[...quantities.values()].map(({ name, answer, fields }) => `  ${name.padEnd(24)} ${fields.map((field) => field.name).join(', ')} → ${answer}\n`).join('')}`;

/** `vouchline bound`: one bound for a person, or a batch of them for a program. */
export function boundCommand(): Command {
  const command = new Command('bound')
    .description('compute a one-sided confidence bound, from figures or a column of measurements')
    .option('--batch', 'answer JSON requests from standard input')
    .addHelpText('after', examples)
    .addHelpText('after', batchHelp);
  for (const asked of [...askedAttributes, ...askedMeasurements]) command.addCommand(commandFor(asked));
  return command.action(async () => {
    if (command.opts<{ batch?: boolean }>().batch === true) return pipeline(process.stdin, answersOf, process.stdout);
    throw new CommandFault(`bound: expected a quantity (${command.commands.map((sub) => sub.name()).join(', ')}) or --batch`);
  });
}

function commandFor(asked: AskedQuantity): Command {
  const command = new Command(asked.command).description(asked.summary);
  for (const field of asked.quantity.fields) if (field.name !== 'line') command.addOption(optionOf(field, asked));
  command.option('--confidence <level>', "confidence level, all of its complement in one tail, e.g. '95 %' or 0.999");
  if (asked.beside.includes('limits')) addLimits(command, asked);
  if (asked.beside.includes('column')) command.option('--csv <file>', 'CSV file with a header line, in place of figures').option('--column <name>', 'its column of measurements');
  if (asked.beside.includes('line')) command.option('--line <value>', `guarantee line to hold the bound against${asked.scale === 'share' ? ", e.g. '200 ppm' or '98.5 %'" : ''}`);
  if (asked.beside.includes('unit')) command.option('--unit <text>', asked.scale === 'rate' ? 'unit of exposure, for the sentence, e.g. m' : 'unit of measure, for the sentence, e.g. ml');
  if (asked.command === 'mean') command.option('--sigma-source <text>', 'where sigma is known from; shown with the bound');
  command.option('--json', 'print JSON');
  return command.action(async () => {
    const told = command.opts<Told>();
    const { answer, refused } = await answerFor(asked, told);
    process.stdout.write(told['json'] === true ? boundJson(answer) : boundText(answer));
    if (refused !== undefined) process.stderr.write(`${refused}\n`);
    if (refused !== undefined || answer.second?.agrees === false) process.exitCode = exitCode.foundWrong;
  });
}

function optionOf({ name, form, help }: Field, { usualSide }: AskedQuantity): Option {
  if (form === 'stations') return new Option('--station <name=nonconforming/inspected...>', 'a station, in order of the line, with the units that reached it');
  if (form === 'number' || form === 'share') return new Option(`--${flagOf(name)} <${form}>`, help);
  return new Option(`--${flagOf(name)} <${form.join('|')}>`, name === 'side' && usualSide !== undefined ? `${help} [default: ${usualSide}]` : help);
}

function addLimits(command: Command, { command: name }: AskedQuantity): void {
  command
    .option('--lsl <number>', 'lower specification limit')
    .option('--usl <number>', 'upper specification limit')
    .option('--mean <number>', 'average of the measurements, where they do not come as a column')
    .option('--sd <number>', 'their sample standard deviation');
  if (name === 'fraction-beyond-limit') command.option('--method <normal|counted>', 'normal when absent; counted assumes no model and needs the column');
}
