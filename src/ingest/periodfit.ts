import { type DayRange, isoDate, type PeriodKind, periodOf } from '../calendar.js';
import type { Config } from '../config.js';
import { exitCodes, UserError } from '../errors.js';
import type { ProductRecords } from '../records.js';

/**
 * Checks that every range of days that the records give lies within one period, so that each quantity has one place in the
 * tables and in the history. Plans may be coarser: they are forecast, and placed nowhere.
 * @throws UserError exit 2 naming the first product and range that does not fit, and the period that would.
 */
export function checkPeriods({ period }: Config, products: readonly ProductRecords[]): void {
  for (const records of products) {
    const range = rangesOf(records).find((days) => !fits(days, period));
    if (range !== undefined) throw tooFine(period, records.product, range, products);
  }
}

function rangesOf({ cohorts, returned, withdrawn }: ProductRecords): readonly DayRange[] {
  return [...cohorts, ...returned, ...withdrawn];
}

function fits({ from, to }: DayRange, period: PeriodKind): boolean {
  return to <= periodOf(from, period).to;
}

function tooFine(
  period: PeriodKind,
  product: string,
  range: DayRange,
  products: readonly ProductRecords[],
): UserError {
  const days = `${isoDate(range.from)} to ${isoDate(range.to - 1)}`;
  const message = `invalid period ${period}: the records of ${product} have one for ${days}, which is within no single ${period}`;
  const own = kinds.find((kind) => fits(range, kind));
  const common = kinds.find((kind) =>
    products.every((records) => rangesOf(records).every((r) => fits(r, kind))),
  );
  const remedy =
    common === undefined
      ? 'give the dates by day, or all by the same kind of period'
      : own === common
        ? `the records of ${product} are by ${own}; set period to ${own}`
        : `set period to ${common}, the finest that holds every record`;
  return new UserError({ code: 'period-too-fine', message, remedy }, exitCodes.unusableSettings);
}

/** From fine to coarse. */
const kinds: readonly PeriodKind[] = ['week', 'month', 'quarter'];
