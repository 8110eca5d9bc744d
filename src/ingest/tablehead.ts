import { type Fault, UserError } from '../errors.js';
import type { Source } from '../records.js';
import type { Columns } from './columns.js';
import type { Dated } from './dated.js';
import type { DateReader } from './dates.js';
import type { FileTally } from './tally.js';

/** A column of a Nevada-style table that is headed by a period. */
export interface PeriodColumn {
  readonly at: number;
  readonly when: Dated;
}

/** What the header of a Nevada-style table says. */
export interface TableHead {
  readonly periods: readonly PeriodColumn[];
  /** The columns, those headed by a period no longer among the unused. */
  readonly columns: Columns;
  /** The columns that are neither a field nor headed by a period. */
  readonly others: readonly { readonly at: number }[];
}

/**
 * Tells the columns that are headed by a period from those that are not.
 * @throws UserError exit 3 when no column is headed by a period, or two by the same.
 */
export function periodColumns(source: Source, columns: Columns, read: DateReader): TableHead {
  const { header, unused } = columns;
  const spare = header.flatMap((name, at) => (name === '' || unused.includes(name) ? [at] : []));
  const periods = spare.flatMap((at) => {
    const when = read(header[at] as string);
    return 'code' in when ? [] : [{ at, when }];
  });
  if (periods.length === 0) throw noPeriods(source, header);
  checkDoubled(source, header, periods);
  const headed = new Set(periods.map(({ at }) => at));
  const others = spare.filter((at) => !headed.has(at)).map((at) => ({ at }));
  const names = others.map(({ at }) => header[at] as string).filter((name) => name !== '');
  return { periods, others, columns: { ...columns, unused: names } };
}

/**
 * Refuses columns that hold something and are neither a field nor headed by a period, since returns in them would be lost.
 * @param strays positions of such columns.
 * @throws UserError exit 3 with a fault for each.
 */
export function checkStrays(tally: FileTally, strays: ReadonlySet<number>, dateFormat: string | null): void {
  if (strays.size === 0) return;
  const remedy = dateFormat === null ? isoRemedy : `head the columns as dateFormat ${dateFormat} says`;
  const place = { code: 'unknown-column', file: tally.source.name, line: 1 };
  const faults = [...strays]
    .sort((a, b) => a - b)
    .map((at): Fault => ({ ...place, message: strayText(tally.columns?.header[at] ?? '', at), remedy }));
  throw new UserError(faults, 3);
}

const isoRemedy = 'head the columns 2026-10, 2026-W45 or 2026-Q4, and leave out what is no period';

function strayText(name: string, at: number): string {
  if (name === '') return `missing header of column ${at + 1}: the column holds something`;
  return `invalid header ${name}: it is no period, and the column holds something`;
}

function checkDoubled(source: Source, header: readonly string[], periods: readonly PeriodColumn[]): void {
  const seen = new Map<number, PeriodColumn>();
  const faults: Fault[] = [];
  for (const period of periods) {
    const before = seen.get(period.when.key);
    seen.set(period.when.key, period);
    if (before === undefined) continue;
    const message = `invalid header: ${header[before.at]} and ${header[period.at]} are the same period`;
    const remedy = 'rename or remove one of them';
    faults.push({ code: 'doubled-header', file: source.name, line: 1, message, remedy });
  }
  if (faults.length > 0) throw new UserError(faults, 3);
}

function noPeriods(source: Source, header: readonly string[]): UserError {
  const message = `missing column headed by a period; the headers are ${header.join(', ')}`;
  const remedy = 'head the columns 2026-10, 2026-W45 or 2026-Q4';
  return new UserError({ code: 'missing-column', file: source.name, line: 1, message, remedy }, 3);
}
