import { type DayRange, isoDate, type PeriodKind, periodLabel, periodOf } from '../calendar.js';
import type { Config } from '../config.js';
import type { Finding, InputRole } from '../records.js';
import { cutOffOrOpen } from './asof.js';
import type { FileTally } from './tally.js';

/** Roles whose files should reach the as-of date. */
const current: readonly InputRole[] = ['shipments', 'returns', 'table'];

/**
 * A warning when no shipment and no return lies in the last complete period by the as-of date, as in an export of an earlier
 * month; none when there is one, or no date at all.
 */
export function endsEarly(config: Config, tallies: readonly FileTally[]): Finding[] {
  const { asOf, period } = config;
  if (asOf === null) return [];
  const ends = tallies.filter(({ role }) => current.includes(role)).map(({ seenUntil }) => seenUntil);
  const until = Math.max(-Infinity, ...ends);
  const last = lastComplete(cutOffOrOpen(config), period);
  if (until === -Infinity || until > last.from) return [];
  const label = periodLabel(last.from, period);
  const message = `the records end early: none is of ${label}, the last complete period by the as-of date ${asOf}, and the last shipment or return is of ${isoDate(until - 1)}; check that the files are up to date`;
  return [{ code: 'records-end-early', severity: 'warning', message }];
}

function lastComplete(cutOff: number, kind: PeriodKind): DayRange {
  const period = periodOf(cutOff - 1, kind);
  return period.to <= cutOff ? period : periodOf(period.from - 1, kind);
}
