/** A chance over a quantity, drawn in characters. */
export interface Curve {
  /** chance at x, 0 to 1 */
  readonly chance: (x: number) => number;
  readonly from: number;
  readonly to: number;
  /** where the guarantee line stands, from `from` to `to`; undefined for none */
  readonly line: number | undefined;
  /** the quantity in words, below the axis */
  readonly label: string;
  /** what the curve shows, above it */
  readonly title: string;
  readonly written: (x: number) => string;
}

const columns = 61;
const rows = 11;

/** The curve in lines of at most 68 characters: a dot in every column, a dashed upright for the guarantee line. */
export function curvePicture({ chance, from, to, line, label, title, written }: Curve): readonly string[] {
  const grid = Array.from({ length: rows }, () => new Array<string>(columns).fill(' '));
  const put = (row: number, column: number, mark: string): void => {
    const cells = grid[row];
    if (cells !== undefined) cells[column] = mark;
  };
  const lineColumn = line === undefined ? -1 : Math.round(((line - from) / (to - from)) * (columns - 1));
  if (lineColumn >= 0) for (let row = 0; row < rows; row++) put(row, lineColumn, '┊');
  let before: number | undefined;
  for (let column = 0; column < columns; column++) {
    const row = Math.round((1 - chance(from + ((to - from) * column) / (columns - 1))) * (rows - 1));
    if (before !== undefined && Math.abs(row - before) > 1) {
      for (let between = Math.min(row, before) + 1; between < Math.max(row, before); between++) put(between, column, '│');
    }
    put(row, column, '●');
    before = row;
  }
  const scale = grid.map((cells, row) => `${row % 5 === 0 ? `${100 - 10 * row} %`.padStart(5) : '     '} ┤${cells.join('').trimEnd()}`);
  return [title, ...scale, `      └${'─'.repeat(columns)}`, ...axis(from, to, written), `${label}${lineColumn >= 0 ? '; ┊ is the guarantee line' : ''}`];
}

/** Five figures below the axis, each as near its place as the others leave room. */
function axis(from: number, to: number, written: (x: number) => string): readonly string[] {
  let text = '';
  for (let step = 0; step <= 4; step++) {
    const figure = written(from + ((to - from) * step) / 4);
    const place = 7 + Math.round((step * (columns - 1)) / 4) - Math.floor(figure.length / 2);
    if (place > text.length || step === 0) text = `${text.padEnd(place)}${figure}`;
  }
  return [text];
}
