// Runs every check of the house and ends with one line that counts them: `N passed, N failed`.
import { spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const top = fileURLToPath(new URL('..', import.meta.url));
const report = join(top, '.build', 'test-report.json');
let passed = 0;
let failed = 0;

function count(name, command, args) {
  process.stdout.write(`\n— ${name}\n`);
  const done = spawnSync(command, args, { cwd: top, stdio: ['ignore', 'inherit', 'inherit'] });
  return done.status === 0;
}

for (const [name, script] of [['types', 'types'], ['lint', 'lint'], ['directions of imports', 'directions']]) {
  if (count(name, 'npm', ['run', '--silent', script])) passed += 1;
  else failed += 1;
}

mkdirSync(join(top, '.build'), { recursive: true });
rmSync(report, { force: true });
const wentWell = count('tests', 'npx', [
  'vitest', 'run', '--config', 'test/vitest.config.ts', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`, ...process.argv.slice(2),
]);
let tests = { numPassedTests: 0, numFailedTests: 0, numFailedTestSuites: 0 };
try {
  tests = JSON.parse(readFileSync(report, 'utf8'));
} catch {
  failed += 1; // The run ended without a report: that is a failure, whatever else it printed.
}
passed += tests.numPassedTests;
failed += tests.numFailedTests;
// A file that could not be loaded, or an error outside a test, fails no single test but fails the run.
if (!wentWell && tests.numFailedTests === 0) failed += 1;

process.stdout.write(`\n${passed} passed, ${failed} failed\n`);
process.exit(failed === 0 && passed > 0 ? 0 : 1);
