/** A column of a table for people. */
export interface TextColumn {
  head: string;
  cells: readonly string[];
  /** Numbers stand to the right. */
  isNumber: boolean;
}

/** Control characters and marks that turn the writing direction would let a file's text draw over the terminal. */
const UNPRINTABLE = /[\p{Cc}\p{Bidi_Control}]/gu;

const WIDEST_CELL = 60;

/** Text from a campaign as it may be printed: on one line, nothing that steers the terminal, not longer than a line. */
export function printable(text: string): string {
  const plain = text.replaceAll(UNPRINTABLE, '\uFFFD');
  return plain.length <= WIDEST_CELL ? plain : `${plain.slice(0, WIDEST_CELL - 1)}…`;
}

/** Lines of a table, columns two blanks apart, with a rule under the heads. */
export function textTable(columns: readonly TextColumn[]): string {
  const widths = columns.map(({ head, cells }) => Math.max(head.length, ...cells.map((cell) => cell.length)));
  const line = (cells: readonly string[]) =>
    cells
      .map((cell, i) => (columns[i]!.isNumber ? cell.padStart(widths[i]!) : cell.padEnd(widths[i]!)))
      .join('  ')
      .trimEnd();
  const rows = Array.from({ length: Math.max(0, ...columns.map(({ cells }) => cells.length)) }, (_, row) =>
    line(columns.map(({ cells }) => cells[row] ?? '')),
  );
  return [line(columns.map(({ head }) => head)), line(widths.map((width) => '─'.repeat(width))), ...rows]
    .map((text) => `${text}\n`)
    .join('');
}

/** A number for people: `digits` after the point, a dash where there is none. */
export function fixed(value: number, digits: number): string {
  return Number.isFinite(value) ? value.toFixed(digits) : '–';
}
