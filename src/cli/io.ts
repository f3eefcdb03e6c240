/** Where a command writes to; a test gives its own. */
export interface Io {
  /** Data: standard output. */
  out(text: string): void;
  /** Messages: standard error. */
  err(text: string): void;
  /** Whether messages go to a terminal, where progress may be drawn. */
  isTerminal: boolean;
  /** Columns of the terminal. */
  width: number;
  /** Whether messages may be coloured. */
  hasColour: boolean;
}

/** The process's own streams; https://no-color.org says what NO_COLOR means. */
export function processIo(): Io {
  const { stdout, stderr, env } = process;
  return {
    out: (text) => void stdout.write(text),
    err: (text) => void stderr.write(text),
    isTerminal: stderr.isTTY === true,
    width: stderr.columns || 80,
    hasColour: stderr.isTTY === true && !env.NO_COLOR,
  };
}

const CODES = { red: 31, yellow: 33, green: 32, bold: 1, faint: 2 } as const;

/** Text in a colour, where colours are wanted. */
export function paint(io: Io, colour: keyof typeof CODES, text: string): string {
  return io.hasColour ? `\u001b[${CODES[colour]}m${text}\u001b[0m` : text;
}
