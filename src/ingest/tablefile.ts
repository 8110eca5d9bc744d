import type { Config } from '../config.js';
import type { Progress, Source } from '../records.js';
import { cutOffOrOpen } from './asof.js';
import { findColumns } from './columns.js';
import { dateReader } from './dates.js';
import { byteProgress } from './progress.js';
import { readRows } from './rows.js';
import { checkStrays, periodColumns } from './tablehead.js';
import { type CohortRow, readCohortRow } from './tablerow.js';
import { type FileTally, newTally, noteDays } from './tally.js';

/** The readable rows of tables, and the accounts of their files. */
export interface CohortRows {
  readonly rows: readonly CohortRow[];
  readonly tallies: readonly FileTally[];
}

/**
 * Reads Nevada-style tables: `product, shipped_in, shipped` and one column a period. Other columns may be there as long as
 * they are empty.
 * @throws UserError exit 3 for a file that cannot be used, such as one without a column headed by a period.
 */
export async function readCohortRows(
  config: Config,
  sources: readonly Source[],
  role: 'table' | 'table-withdrawn',
  progress: Progress,
): Promise<CohortRows> {
  const input = role === 'table' ? config.table : config.tableWithdrawn;
  const cutOff = cutOffOrOpen(config);
  const rows: CohortRow[] = [];
  const tallies = sources.map((source) => newTally(source, role));
  const read = dateReader(input.dateFormat);
  for (const tally of tallies) {
    const strays = new Set<number>();
    const begin = (header: string[]) => {
      const found = periodColumns(tally.source, findColumns(role, tally.source.name, header, input), read);
      tally.columns = found.columns;
      tally.unitsAt = found.periods.map(({ at }) => at);
      return (cells: string[], line: number) => {
        const row = readCohortRow(tally, { cells, line }, found.periods, read);
        if (row !== null) {
          rows.push(row);
          noteDays(tally, row.shippedIn, cutOff);
        }
        if (cells.length !== header.length) return;
        for (const { at } of filled(found.others, cells)) strays.add(at);
        for (const { when } of filled(found.periods, cells)) noteDays(tally, when, cutOff);
      };
    };
    tally.read = await readRows(tally.source, input.encoding, begin, await byteProgress(tally, progress));
    checkStrays(tally, strays, input.dateFormat);
  }
  return { rows, tallies };
}

/** The columns whose cell in a row holds something; a 0 is something. */
function filled<T extends { readonly at: number }>(columns: readonly T[], cells: readonly string[]): T[] {
  return columns.filter(({ at }) => cells[at]?.trim() !== '');
}
