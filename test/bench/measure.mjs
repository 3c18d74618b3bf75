// What the benchmarks of the whole path share: medians, percentiles, processor time, and a table for people.
import { cpus } from 'node:os';

export const median = (of) => percentile(of, 0.5);

/** Smallest value that at least the share `q` of the values does not exceed. */
export function percentile(of, q) {
  const sorted = Float64Array.from(of).sort();
  return sorted[Math.max(0, Math.ceil(q * sorted.length) - 1)];
}

/** Processor time this process spends from now until it is asked, in microseconds; all its threads together. */
export function processorTime() {
  const begin = process.cpuUsage();
  return () => {
    const { user, system } = process.cpuUsage(begin);
    return user + system;
  };
}

export const pause = (ms) => new Promise((resolve) => setTimeout(resolve, ms));

/** Prints rows of text as a markdown table. */
export function table(heads, rows) {
  const line = (cells) => `| ${cells.join(' | ')} |`;
  console.log([line(heads), line(heads.map(() => '---')), ...rows.map(line), ''].join('\n'));
}

export function tellMachine() {
  const [first] = cpus();
  console.log(`${cpus().length} × ${first?.model ?? 'unknown processor'}, Node ${process.versions.node}, ${new Date().toISOString().slice(0, 10)}\n`);
}
