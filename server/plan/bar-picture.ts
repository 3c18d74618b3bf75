/** A figure with its name, to be drawn as a bar. */
export interface Bar {
  readonly name: string;
  /** above 0, finite */
  readonly value: number;
  readonly written: string;
}

const longest = 40;

/** Bars on a logarithmic scale, which tells three days from three months; the title says so. */
export function barPicture(title: string, bars: readonly Bar[]): readonly string[] {
  if (bars.length === 0) return [];
  const logs = bars.map(({ value }) => Math.log10(value));
  const from = Math.floor(Math.min(...logs));
  const to = Math.max(from + 1, Math.max(...logs));
  const width = Math.max(...bars.map(({ name }) => name.length));
  const lines = bars.map(({ name, written }, at) => `${name.padStart(width)} ┤${'█'.repeat(Math.max(1, Math.round((((logs[at] ?? from) - from) / (to - from)) * longest)))} ${written}`);
  return [`${title} (logarithmic scale from ${10 ** from})`, ...lines];
}
