import { existsSync } from 'node:fs';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { dirname, join, relative } from 'node:path';
import { StoreError } from './store-error.ts';

/**
 * Where the compiled program of a thread lies. Compiled code asks for its neighbour; code run from its TypeScript
 * source (tests) is sent to the neighbour's compiled form under .build.
 *
 * @param name file name of the thread's module without ending, e.g. 'commit-worker'
 * @param from import.meta.url of the asking module, in the same folder
 * @throws StoreError 'not-built'
 */
export function workerUrl(name: string, from: string): URL {
  const asking = fileURLToPath(from);
  const folder = asking.endsWith('.ts') ? builtFolder(dirname(asking)) : dirname(asking);
  const file = join(folder, `${name}.js`);
  if (!existsSync(file)) {
    throw new StoreError('not-built', `The compiled thread ${file} is missing: run "npm run build" (or "npx tsc -p server") first.`);
  }
  return pathToFileURL(file);
}

function builtFolder(folder: string): string {
  let top = folder;
  while (!existsSync(join(top, 'package.json'))) {
    const up = dirname(top);
    if (up === top) throw new StoreError('not-built', `No package.json above ${folder}: cannot tell where the compiled code lies.`);
    top = up;
  }
  return join(top, '.build', relative(top, folder));
}
