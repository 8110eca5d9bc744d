import { exitCodes, type Fault, UserError } from '../errors.js';
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
 * @throws UserError exit 3 when no column is headed by a period, or two by periods that share days.
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
  throw new UserError(faults, exitCodes.unusableInput);
}

const isoRemedy = 'head the columns 2026-10, 2026-W45 or 2026-Q4, and leave out what is no period';

function strayText(name: string, at: number): string {
  if (name === '') return `missing header of column ${at + 1}: the column holds something`;
  return `invalid header ${name}: it is no period, and the column holds something`;
}

/** Each column against the one before it that ends last, so that a long period meets all that lie within it. */
function checkDoubled(source: Source, header: readonly string[], periods: readonly PeriodColumn[]): void {
  const faults: Fault[] = [];
  let latest: PeriodColumn | null = null;
  for (const period of [...periods].sort((a, b) => a.when.from - b.when.from || a.at - b.at)) {
    if (latest !== null && period.when.from < latest.when.to) {
      const message = doubledText(header, latest, period);
      const remedy = 'rename or remove one of them';
      faults.push({ code: 'doubled-header', file: source.name, line: 1, message, remedy });
    }
    if (latest === null || period.when.to > latest.when.to) latest = period;
  }
  if (faults.length > 0) throw new UserError(faults, exitCodes.unusableInput);
}

function doubledText(header: readonly string[], a: PeriodColumn, b: PeriodColumn): string {
  const how = a.when.key === b.when.key ? 'are the same period' : 'share days';
  return `invalid header: ${header[a.at]} and ${header[b.at]} ${how}`;
}

function noPeriods(source: Source, header: readonly string[]): UserError {
  const message = `missing column headed by a period; the headers are ${header.join(', ')}`;
  const remedy = 'head the columns 2026-10, 2026-W45 or 2026-Q4';
  return new UserError(
    { code: 'missing-column', file: source.name, line: 1, message, remedy },
    exitCodes.unusableInput,
  );
}
