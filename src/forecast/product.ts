import { parseIsoDate } from '../calendar.js';
import { type Config, type ProductRules, rulesOf } from '../config.js';
import { type Precision, precisionFor } from '../exposure/grid.js';
import { freeOf } from '../families/family.js';
import { familyNamed } from '../families/index.js';
import type {
  CandidateFit,
  CandidateForecast,
  FitProduct,
  ForecastMethod,
  ForecastPeriod,
  ForecastProduct,
  NotForecast,
  ParameterDraws,
  ProductRecords,
} from '../records.js';
import { exposedAges } from './ages.js';
import { exposedCohorts } from './cohorts.js';
import { type Column, firstAndLast, forecastColumns } from './columns.js';
import { type PredictiveCounts, predictiveCounts } from './counts.js';
import { type Expectation, type Exposed, expectation } from './exposed.js';
import { choiceFinding, costFinding, plugInFinding } from './findings.js';
import { historyOf } from './history.js';
import { columnOf, cumulative, cumulativeColumns, predictedCount, quantileProbabilities } from './summary.js';

/** A product's forecast with the draws behind it, for sums over products. */
export interface ProductDraws {
  readonly product: ForecastProduct;
  /** Null when the product is not forecast. */
  readonly counts: Pick<PredictiveCounts, 'counts' | 'columns'> | null;
}

/** What there is of a product that is not forecast. */
const nothing = {
  chosen: null,
  method: null,
  periods: [],
  untilWarrantyEnds: null,
  ifRejectedWereReal: null,
  findings: [],
};

/** A label and its days; without a calendar, the number of a step of use. */
type Step = Pick<Column, 'label' | 'partial'> & { readonly days: Column['days'] | null };

/**
 * The forecast of one product: expected returns and predictive quantiles by period, cumulative and until warranty ends.
 * @param draws the parameters' draws, or why the product cannot be forecast.
 */
export function forecastProduct(
  config: Config,
  records: ProductRecords,
  fit: FitProduct,
  draws: ParameterDraws | NotForecast,
): ProductDraws {
  const steps = stepsOf(config, records);
  const exact = exposedOf(config, records, steps, 'fit');
  const shared = {
    product: records.product,
    segment: records.segment,
    currency: rulesOf(config, records.product).currency,
    byCandidate: fit.candidates.filter((c) => c.converged).map((c) => byCandidate(c, exact)),
  };
  if ('code' in draws) {
    const history = historyOf(config, records, null);
    return { product: { ...shared, ...nothing, notForecast: draws, history }, counts: null };
  }
  const family = familyNamed(draws.family);
  const best = freeOf(
    family,
    (fit.candidates.find((c) => c.family === family.name) as CandidateFit).parameters,
  );
  const plugIn = expectation(exact, exact.chances(family.jetsAt(best)));
  const predicted = predictiveCounts(exposedOf(config, records, steps, precisionFor(family, best)), draws);
  const periods = periodsOf(config, records, steps, plugIn, predicted);
  const until = exact.limited ? untilWarrantyEnds(config, plugIn, predicted) : null;
  const product: ForecastProduct = {
    ...shared,
    chosen: family.name,
    notForecast: null,
    method: methodOf(draws, predicted),
    periods,
    untilWarrantyEnds: until,
    history: historyOf(config, records, { family, free: best }),
    ifRejectedWereReal: ifRejectedWereReal(records, fit, periods),
    findings: [
      ...draws.findings,
      ...plugInFinding(periods, until),
      ...costFinding(shared.currency, periods),
      ...choiceFinding(config, shared.byCandidate, family.name, periods),
    ],
  };
  return { product, counts: { counts: predicted.counts, columns: predicted.columns } };
}

function stepsOf(config: Config, records: ProductRecords): Step[] {
  if (records.resolution !== 'age') return forecastColumns(config);
  return Array.from({ length: config.horizon }, (_, i) => ({
    label: String(i + 1),
    days: null,
    partial: false,
  }));
}

function exposedOf(
  config: Config,
  records: ProductRecords,
  steps: readonly Step[],
  precision: Precision,
): Exposed {
  if (records.resolution === 'age') return exposedAges(config, records, steps.length, config.ageStep ?? 0);
  return exposedCohorts(config, records, steps as Column[], precision);
}

function byCandidate(candidate: CandidateFit, exposed: Exposed): CandidateForecast {
  const family = familyNamed(candidate.family);
  const jets = family.jetsAt(freeOf(family, candidate.parameters));
  const { periods, untilWarrantyEnds } = expectation(exposed, exposed.chances(jets));
  return {
    family: candidate.family,
    atRisk: candidate.atRisk,
    weight: candidate.weight,
    ruledOut: candidate.ruledOut,
    nextPeriod: periods[0] ?? 0,
    horizon: periods.reduce((sum, x) => sum + x, 0),
    untilWarrantyEnds: exposed.limited ? untilWarrantyEnds : null,
  };
}

function periodsOf(
  config: Config,
  records: ProductRecords,
  steps: readonly Step[],
  plugIn: Expectation,
  { counts, columns, mean }: PredictiveCounts,
): ForecastPeriod[] {
  const rules = rulesOf(config, records.product);
  const probabilities = quantileProbabilities(config.levels);
  const sums = cumulativeColumns(counts, columns, steps.length);
  const [expectedSums, plugInSums] = [cumulative(mean.periods), cumulative(plugIn.periods)];
  return steps.map(({ label, days, partial }, j) => {
    const expected = mean.periods[j] as number;
    return {
      period: label,
      ...(days === null ? { from: null, to: null } : firstAndLast(days)),
      partial,
      ...predictedCount(expected, plugIn.periods[j] as number, columnOf(counts, columns, j), probabilities),
      cumulative: predictedCount(
        expectedSums[j] as number,
        plugInSums[j] as number,
        sums[j] as Float64Array,
        probabilities,
      ),
      planned: { expected: mean.planned[j] as number, plugIn: plugIn.planned[j] as number },
      expectedCost: costOf(rules, expected, days?.from ?? null),
    };
  });
}

/** Expected returns at the cost per return in force on a day; without a calendar the first cost. */
function costOf(rules: ProductRules, expected: number, day: number | null): number | null {
  const inForce = rules.costPerReturn.filter(
    ({ from }) => from === null || day === null || (parseIsoDate(from) ?? Infinity) <= day,
  );
  const amount = day === null ? inForce[0]?.amount : inForce.at(-1)?.amount;
  return amount === undefined ? null : expected * amount;
}

function untilWarrantyEnds(config: Config, plugIn: Expectation, { counts, columns, mean }: PredictiveCounts) {
  const draws = columnOf(counts, columns, columns - 1);
  const probabilities = quantileProbabilities(config.levels);
  return predictedCount(mean.untilWarrantyEnds, plugIn.untilWarrantyEnds, draws, probabilities);
}

function methodOf(draws: ParameterDraws, { draws: count }: PredictiveCounts): ForecastMethod {
  const assumes =
    'the return rate by age does not change with the calendar, units return independently of one another, and the chosen family is the right one';
  return { draws: count, parameters: draws.kind, restarted: draws.restarted, counts: 'multinomial', assumes };
}

/** In first order the rate, and with it the forecast, rises in proportion to the returns. */
function ifRejectedWereReal(
  records: ProductRecords,
  fit: FitProduct,
  periods: readonly ForecastPeriod[],
): number | null {
  const horizon = periods.at(-1)?.cumulative.expected;
  return horizon === undefined || fit.returns === 0
    ? null
    : (horizon * records.rejectedReturns) / fit.returns;
}
