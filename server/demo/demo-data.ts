import { copyFileSync, existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** A directory that the demo will not write into, or cannot go on in. */
export class BadDemoData extends Error {}

/** Where the demo keeps its data. */
export interface DemoData {
  readonly directory: string;
  readonly plantFile: string;
  readonly seed: number;
}

const usualSeed = 1;

/**
 * Makes a directory ready for the demo, or takes up one in which a demo has lived before. The plant file is copied
 * into it, so that people can change it and see what comes of it.
 *
 * @param seed undefined: that of the demo that lived there, or the usual one
 * @throws BadDemoData where the directory holds other data, or a demo of another seed
 */
export function demoData(directory: string, seed: number | undefined): DemoData {
  const marker = join(directory, 'demo.json');
  const plantFile = join(directory, 'plant.yaml');
  if (existsSync(marker)) {
    const lived = (JSON.parse(readFileSync(marker, 'utf8')) as { seed: number }).seed;
    if (seed !== undefined && seed !== lived) throw new BadDemoData(`The demo in ${directory} was begun with --seed ${lived}; it cannot go on with ${seed}.`);
    return { directory, plantFile, seed: lived };
  }
  mkdirSync(directory, { recursive: true, mode: 0o700 });
  if (readdirSync(directory).length > 0) {
    throw new BadDemoData(`The directory ${directory} is not empty, and what it holds is no demo's; invented records must not get in among others.`);
  }
  copyFileSync(fileURLToPath(new URL('hose-works.yaml', import.meta.url)), plantFile);
  const begun = seed ?? usualSeed;
  writeFileSync(marker, `${JSON.stringify({ seed: begun })}\n`);
  return { directory, plantFile, seed: begun };
}
