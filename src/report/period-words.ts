/** The words that depend on the period of the run. */
import type { Config } from '../config.js';
import { dateText, periodText } from './dates.js';
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
  /** `November 2026`, `rest of October 2026`, `500 to 1,000 hours`. */
  readonly name: (label: string, partial: boolean) => string;
  /** `over the 12 months to 31 October 2027`, from the number of whole periods and the last day. */
  readonly over: (periods: number, lastDay: string | null) => string;
}

/** Words for the calendar of the run, or for its steps of use. */
export function periodWords(input: ReportInput): PeriodWords {
  if (input.table.asOf === null) return useWords(input.settings, input.table.ageUnit);
  const noun = input.table.period;
  const name = (label: string, partial: boolean) => `${partial ? 'rest of ' : ''}${periodText(label)}`;
  return {
    noun,
    per: noun,
    name,
    during: (label, partial) => `in ${partial ? 'the ' : ''}${name(label, partial)}`,
    over: (periods, lastDay) => {
      const end = lastDay === null ? '' : ` to ${dateText(lastDay)}`;
      return `over the ${periods === 1 ? noun : `${periods} ${noun}s`}${end}`;
    },
  };
}

function useWords(settings: Config, ageUnit: string): PeriodWords {
  const unit = plural(ageUnit);
  const use = (steps: number) => measureText(steps * (settings.ageStep ?? 1));
  const name = (label: string) => `${use(Number(label) - 1)} to ${use(Number(label))} ${unit}`;
  return {
    noun: 'step',
    per: `${use(1)} ${unit} of use`,
    name,
    during: (label) => (label === '1' ? `in the next ${use(1)} ${unit} of use` : `from ${name(label)} on`),
    over: (steps) => `over the next ${use(steps)} ${unit} of use`,
  };
}

/** `hours`; a short unit such as `km` is a symbol and stays. */
export function plural(unit: string): string {
  return unit.length <= 3 && unit !== 'day' ? unit : unit.endsWith('s') ? unit : `${unit}s`;
}
