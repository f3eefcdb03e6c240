import { InputError } from '../errors.js';
import type { Command } from './command.js';

interface ShowOptions {
  file: string;
  head?: number | undefined;
  where: string[];
  csv?: string | undefined;
}

/** `treadline show FILE.arrow`. */
export const showCommand: Command<ShowOptions> = {
  usage: 'show <file>',
  summary: 'look into any table',
  options: (yargs) =>
    yargs
      .positional('file', { type: 'string', demandOption: true, describe: 'an .arrow file' })
      .option('head', {
        type: 'number',
        requiresArg: true,
        describe: 'rows to print, 0 for all; default 20, and all with --csv or --json',
      })
      .option('where', {
        type: 'string',
        array: true,
        default: [] as string[],
        describe: "rows to keep, as an arquero expression of the row d: 'd.error_m > 3'",
      })
      .option('csv', {
        type: 'string',
        requiresArg: true,
        describe: 'write the rows to this CSV file; - prints them',
      }),
  examples: [
    ['treadline show results/default/w03/steps.arrow --head 5', 'what it is, then five steps'],
    [
      "treadline show results/default/walk-scores.arrow --where 'd.p75_m > 4' --csv bad.csv",
      'bad walks for a spreadsheet',
    ],
  ],
  async run({ file, head, where, csv, json, quiet }, io) {
    const { readStored } = await import('../tables/read.js');
    const { filterRows } = await import('../tables/filter-rows.js');
    const { tableText } = await import('./table-text.js');
    if (json && csv !== undefined) throw new InputError('usage', '--csv and --json: give one of them');
    const stored = readStored(file);
    const table = filterRows(stored, where);
    const wanted = head ?? (json || csv !== undefined ? 0 : 20);
    const rows = wanted === 0 ? table.nRows : Math.min(wanted, table.nRows);
    if (json) io.out(`${JSON.stringify(table.rows(rows), null, 2)}\n`);
    else if (csv === undefined) io.out(tableText(stored, table, rows, quiet));
    else {
      const { csvText } = await import('../tables/csv-text.js');
      const text = csvText(table.rows(rows), table.names);
      if (csv === '-') io.out(text);
      else {
        const { writeText } = await import('../tables/write.js');
        writeText(csv, text);
        if (!quiet) io.err(`${rows} rows in ${csv}\n`);
      }
    }
    return 0;
  },
};
