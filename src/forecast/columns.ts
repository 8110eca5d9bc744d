import { type DayRange, isoDate, periodLabel, periodOf, periodsIn } from '../calendar.js';
import { type Config, cutOffOf } from '../config.js';

/** A period of the forecast. */
export interface Column {
  readonly label: string;
  /** The days that count, from the cut-off on. */
  readonly days: DayRange;
  /** True for the rest of a period that the cut-off falls into. */
  readonly partial: boolean;
}

/** The rest of the period that the cut-off falls into, if any, and then `horizon` whole periods. */
export function forecastColumns(config: Config): Column[] {
  const cutOff = cutOffOf(config);
  const columns: Column[] = [];
  let period = periodOf(cutOff, config.period);
  if (period.from < cutOff) {
    columns.push({
      label: periodLabel(cutOff, config.period),
      days: { from: cutOff, to: period.to },
      partial: true,
    });
    period = periodOf(period.to, config.period);
  }
  for (let i = 0; i < config.horizon; i++) {
    columns.push({ label: periodLabel(period.from, config.period), days: period, partial: false });
    period = periodOf(period.to, config.period);
  }
  return columns;
}

/** The whole periods from the first ship day to the cut-off; the last one is cut there. */
export function pastColumns(config: Config, firstShipDay: number): Column[] {
  const cutOff = cutOffOf(config);
  return periodsIn({ from: firstShipDay, to: cutOff }, config.period).map((period) => ({
    label: periodLabel(period.from, config.period),
    days: { from: period.from, to: Math.min(period.to, cutOff) },
    partial: period.to > cutOff,
  }));
}

/** First and last day in ISO form. */
export function firstAndLast(days: DayRange): { from: string; to: string } {
  return { from: isoDate(days.from), to: isoDate(days.to - 1) };
}
