/** A table for people; every cell is text, the first row names the columns. */
export interface Table {
  readonly head: readonly string[];
  readonly rows: readonly (readonly string[])[];
}

/** What a plan comes to: sentences, a table, a picture, what it rests on, and the same for programs. */
export interface PlanAnswer {
  readonly sentences: readonly string[];
  readonly table: Table | undefined;
  /** lines of a drawing, without line ends */
  readonly picture: readonly string[];
  /** what to mind: assumptions, look rule, source */
  readonly notes: readonly (readonly [name: string, said: string])[];
  readonly json: Readonly<Record<string, unknown>>;
}

/** The answer for people. */
export function planText({ sentences, table, picture, notes }: PlanAnswer): string {
  const parts = [
    sentences.join('\n'),
    table === undefined ? '' : tableText(table),
    picture.join('\n'),
    notes.map(([name, said]) => `${name.padEnd(9)}${said}`).join('\n'),
  ];
  return `${parts.filter((part) => part !== '').join('\n\n')}\n`;
}

function tableText({ head, rows }: Table): string {
  const all = [head, ...rows];
  const widths = head.map((_, column) => Math.max(...all.map((row) => (row[column] ?? '').length)));
  const line = (row: readonly string[]): string => row.map((cell, column) => (column === 0 ? cell.padEnd(widths[column] ?? 0) : cell.padStart(widths[column] ?? 0))).join('   ').trimEnd();
  return [line(head), widths.map((width) => '─'.repeat(width)).join('   '), ...rows.map(line)].join('\n');
}
