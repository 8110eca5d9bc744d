import { csvLine } from '../csv.js';
import type { RejectRow } from '../records.js';

/** Columns of `rejects.csv`. */
export const rejectColumns = ['file', 'line', 'kind', 'code', 'column', 'message', 'row'] as const;

/** `rejects.csv`: every row that is not used, in the order of the intake (file, line). */
export function rejectsCsv(rejects: readonly RejectRow[]): string {
  return (
    csvLine(rejectColumns) + rejects.map((reject) => csvLine(rejectColumns.map((c) => reject[c]))).join('')
  );
}
