/** The large figures under a headline. */
import type { ForecastTotal, PredictedCount } from '../records.js';
import { betweenText } from './intervals.js';
import { expectedText, moneyText } from './numbers.js';

/** A label, what it stands for, and how sure that is. */
export interface Figure {
  readonly label: string;
  /** One a currency; never broken over lines. */
  readonly values: readonly string[];
  /** How long the longest value is: `short` up to 9 characters, `long` up to 15, else `longest`. */
  readonly size: 'short' | 'long' | 'longest';
  readonly detail: string;
  /** Whether it gets a row of its own where the page is narrow. */
  readonly broad: boolean;
}

/** A count to come with its interval at a level. */
export function countFigure(count: PredictedCount, level: number, label: string): Figure {
  return figure(label, [expectedText(count.expected)], betweenText(count, level));
}

/**
 * The expected cost, none where no cost is set. @param costless products that are forecast without a cost.
 * @param over what it is summed over, `over the 12 months to 31 October 2027`.
 */
export function costFigure(
  costs: ForecastTotal['costs'],
  costless: readonly string[],
  over: string,
): readonly Figure[] {
  if (costs.length === 0) return [];
  const values = costs.map((cost) => moneyText(cost.expectedCost, cost.currency));
  const without =
    costless.length === 0 ? '' : `; without the returns of ${listed(costless)} for which no cost is set`;
  const detail = `expected returns at the cost per return in force${without}`;
  return [figure(`expected cost ${over}`, values, detail)];
}

function figure(label: string, values: readonly string[], detail: string): Figure {
  const longest = Math.max(...values.map((value) => value.length));
  const size = longest <= 9 ? 'short' : longest <= 15 ? 'long' : 'longest';
  const broad = size !== 'short';
  return { label: label.charAt(0).toUpperCase() + label.slice(1), values, size, detail, broad };
}

/** `A`, `A and B`, `A, B, C and 9 others`. */
function listed(names: readonly string[]): string {
  const shown = names.length <= 4 ? names : [...names.slice(0, 3), `${names.length - 3} others`];
  return shown.length < 2 ? shown.join('') : `${shown.slice(0, -1).join(', ')} and ${shown.at(-1)}`;
}
