import type { InputConfig } from '../config.js';
import { UserError } from '../errors.js';
import type { Progress, Source } from '../records.js';
import { findColumns } from './columns.js';
import { dateReader } from './dates.js';
import { byteProgress } from './progress.js';
import { readRows } from './rows.js';
import { type CohortRow, periodColumns, readCohortRow } from './tablerow.js';
import { type FileTally, newTally } from './tally.js';

/** The readable rows of tables, and the accounts of their files. */
export interface CohortRows {
  readonly rows: readonly CohortRow[];
  readonly tallies: readonly FileTally[];
}

/**
 * Reads Nevada-style tables: `product, shipped_in, shipped` and one column a period.
 * @throws UserError exit 3 for a file that cannot be used, such as one without a column headed by a period.
 */
export async function readCohortRows(
  sources: readonly Source[],
  role: 'table' | 'table-withdrawn',
  input: InputConfig,
  progress: Progress,
): Promise<CohortRows> {
  const rows: CohortRow[] = [];
  const tallies = sources.map((source) => newTally(source, role));
  const read = dateReader(input.dateFormat);
  for (const tally of tallies) {
    const begin = (header: string[]) => {
      const found = periodColumns(findColumns(role, tally.source.name, header, input), read);
      tally.columns = found.columns;
      tally.unitsAt = found.periods.map(({ at }) => at);
      if (found.periods.length === 0) throw noPeriods(tally.source, found.columns.header);
      return (cells: string[], line: number) => {
        const row = readCohortRow(tally, { cells, line }, found.periods, read);
        if (row !== null) rows.push(row);
      };
    };
    tally.read = await readRows(tally.source, input.encoding, begin, await byteProgress(tally, progress));
  }
  return { rows, tallies };
}

function noPeriods(source: Source, header: readonly string[]): UserError {
  const message = `missing column headed by a period; the headers are ${header.join(', ')}`;
  const remedy = 'head the columns 2026-10, 2026-W45 or 2026-Q4';
  return new UserError({ code: 'missing-column', file: source.name, line: 1, message, remedy }, 3);
}
