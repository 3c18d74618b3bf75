import { readFileSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { Command } from 'commander';
import { plantJsonSchema } from '../../core/plant/plant-json-schema.ts';
import { readPlant } from '../../core/plant/read-plant.ts';
import { plantVersionOf } from '../plant-file.ts';
import { CommandFault, exitCode } from './exit-codes.ts';

const examples = `
Examples:
  vouchline plant example > plant.yaml           a commented plant file to begin with
  vouchline plant check plant.yaml               faults are named with line and column
  vouchline plant check --json plant.yaml        the same for programs
  vouchline plant schema > plant.schema.json     for editors that know JSON Schema

Exit codes: 0 in order, 2 the plant file has faults or cannot be read.`;

/** A plant file to begin with: one line, one product, one guarantee. */
export function examplePlant(): string {
  return readFileSync(new URL('./example-plant.yaml', import.meta.url), 'utf8');
}

export function plantCommand(): Command {
  const command = new Command('plant').description('plant files: check one, print what can stand in one, print one to begin with').addHelpText('after', examples);
  command
    .command('check')
    .description('check a plant file, and say everything that is wrong with it')
    .argument('<file>', 'plant file (YAML or JSON)')
    .option('--json', 'print JSON')
    .action(check);
  command.command('schema').description('print the JSON Schema (draft 2020-12) of plant files').action(() => {
    process.stdout.write(`${JSON.stringify(plantJsonSchema(), null, 2)}\n`);
  });
  command.command('example').description('print a commented plant file to begin with').action(() => {
    process.stdout.write(examplePlant());
  });
  return command;
}

async function check(path: string, { json }: { readonly json?: boolean }): Promise<void> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (cause) {
    throw new CommandFault(`The plant file ${path} cannot be read: ${(cause as Error).message}`);
  }
  const version = plantVersionOf(text);
  const reading = readPlant(text, version);
  if (!reading.ok) {
    if (json === true) process.stdout.write(`${JSON.stringify({ sound: false, faults: reading.fault })}\n`);
    else for (const { line, column, sentence } of reading.fault) process.stderr.write(`${path}:${line}:${column}: ${sentence}\n`);
    process.exitCode = exitCode.badInput;
    return;
  }
  const { lines, products, guarantees } = reading.value.plant;
  const counts = { lines: lines.length, products: products.length, guarantees: guarantees.length };
  if (json === true) process.stdout.write(`${JSON.stringify({ sound: true, version, ...counts })}\n`);
  else process.stdout.write(`${path} is in order (version ${version}): lines ${counts.lines}, products ${counts.products}, guarantees ${counts.guarantees}\n`);
}
