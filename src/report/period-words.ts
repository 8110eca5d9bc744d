/** The words that depend on the period of the run. */
import type { Config } from '../config.js';
import { dateText, periodText, shortPeriodText } from './dates.js';
import { measureText } from './numbers.js';
import type { ReportInput } from './parts.js';

/** What periods are called in this report. */
export interface PeriodWords {
  /** `month`, or `step` without a calendar. */
  readonly noun: string;
  /** What a count is per: `month`, `500 hours of use`. */
  readonly per: string;
  /** `in November 2026`, `in the rest of October 2026`, `in the next 500 hours of use`. */
  readonly during: (label: string, partial: boolean) => string;
  /** `November 2026`, `rest of October 2026`, `next 500 hours`, `500 to 1,000 hours from now`. */
  readonly name: (label: string, partial: boolean) => string;
  /** The same for a table: `Nov 2026`, `rest of Oct 2026`. */
  readonly short: (label: string, partial: boolean) => string;
  /** The next so many periods: `next 12 months`, `next 6,000 hours of use`. */
  readonly next: (periods: number) => string;
  /** `over the 12 months to 31 October 2027`; with the rest of a period first `from 11 October 2026 to 31 October 2027`. */
  readonly over: (span: Span) => string;
  /** Whose returns until warranty ends are counted: `units shipped so far`. */
  readonly standing: string;
  /** What a chart's axis of periods counts, null where its labels say it. */
  readonly axis: string | null;
}

/** What a sum runs over. */
export interface Span {
  /** Whole periods. */
  readonly periods: number;
  readonly lastDay: string | null;
  /** The first day where the rest of a period comes first, else null. */
  readonly partialFrom: string | null;
}

/** Words for the calendar of the run, or for its steps of use. */
export function periodWords(input: ReportInput): PeriodWords {
  if (input.table.asOf === null) return useWords(input.settings, input.table.ageUnit);
  const noun = input.table.period;
  const rest = (partial: boolean) => (partial ? 'rest of ' : '');
  const name = (label: string, partial: boolean) => `${rest(partial)}${periodText(label)}`;
  return {
    noun,
    per: noun,
    name,
    short: (label, partial) => `${rest(partial)}${shortPeriodText(label)}`,
    during: (label, partial) => `in ${partial ? 'the ' : ''}${name(label, partial)}`,
    next: (periods) => (periods === 1 ? `next ${noun}` : `next ${periods} ${noun}s`),
    over: ({ periods, lastDay, partialFrom }) => {
      const end = lastDay === null ? '' : ` to ${dateText(lastDay)}`;
      if (partialFrom !== null) return `from ${dateText(partialFrom)}${end}`;
      return `over the ${periods === 1 ? noun : `${periods} ${noun}s`}${end}`;
    },
    standing: 'units shipped so far',
    axis: null,
  };
}

function useWords(settings: Config, ageUnit: string): PeriodWords {
  const unit = plural(ageUnit);
  const use = (steps: number) => measureText(steps * (settings.ageStep ?? 1));
  const next = (steps: number) => `next ${use(steps)} ${unit} of use`;
  const name = (label: string) =>
    label === '1'
      ? `next ${use(1)} ${unit}`
      : `${use(Number(label) - 1)} to ${use(Number(label))} ${unit} from now`;
  return {
    noun: 'step',
    per: `${use(1)} ${unit} of use`,
    name,
    short: name,
    during: (label) => (label === '1' ? `in the ${next(1)}` : name(label)),
    next,
    over: ({ periods }) => `over the ${next(periods)}`,
    standing: 'units in service',
    axis: `steps of ${use(1)} ${unit} of use from now`,
  };
}

/** `hours`; a short unit such as `km` is a symbol and stays. */
export function plural(unit: string): string {
  return unit.length <= 3 && unit !== 'day' ? unit : unit.endsWith('s') ? unit : `${unit}s`;
}
