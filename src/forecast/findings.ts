import type { Config } from '../config.js';
import { familyLabel } from '../family-label.js';
import { intervalKeys } from '../quantiles.js';
import type { CandidateForecast, Finding, ForecastPeriod, PredictedCount } from '../records.js';

/** Weight of the candidates outside the interval from which on it is worth a warning. */
const noticedWeight = 0.1;

/** Mean of the predictive distribution and plug-in figure differ by more than 5 % over the horizon or until warranty ends. */
export function plugInFinding(
  periods: readonly ForecastPeriod[],
  untilWarrantyEnds: PredictedCount | null,
): Finding[] {
  const sums = [
    { name: 'over the horizon', count: periods.at(-1)?.cumulative },
    { name: 'until warranty ends', count: untilWarrantyEnds },
  ];
  const apart = sums.flatMap(({ name, count }) => {
    const percent = count?.plugIn ? 100 * (count.expected / count.plugIn - 1) : 0;
    const side = percent < 0 ? 'below' : 'above';
    return Math.abs(percent) > 5 ? [`${name} ${Math.round(Math.abs(percent))} % ${side}`] : [];
  });
  if (apart.length === 0) return [];
  const message =
    `the mean over the uncertainty of the parameters differs from the forecast at their best values: ${apart.join(', ')}; ` +
    'the returns leave the parameters wide open';
  return [{ code: 'mean-differs-from-plug-in', severity: 'note', message }];
}

/** Other candidates of some weight expect a horizon outside the first interval: it does not hold the doubt about the family. */
export function choiceFinding(
  config: Config,
  candidates: readonly CandidateForecast[],
  chosen: string,
  periods: readonly ForecastPeriod[],
): Finding[] {
  const level = config.levels[0];
  const quantiles = periods.at(-1)?.cumulative.quantiles;
  if (level === undefined || quantiles === undefined) return [];
  const [lower, upper] = intervalKeys(level).map((key) => quantiles[key] as number) as [number, number];
  const outside = candidates.filter(
    ({ family, ruledOut, horizon }) =>
      family !== chosen && ruledOut === null && (horizon < lower || horizon > upper),
  );
  const weight = outside.reduce((sum, candidate) => sum + candidate.weight, 0);
  if (weight < noticedWeight) return [];
  const named = outside
    .map(({ family, horizon }) => `${familyLabel(family)} ${Math.round(horizon)}`)
    .join(', ');
  const message =
    `the interval takes the ${familyLabel(chosen)} distribution as right; other candidates, with ${Math.round(100 * weight)} % of the weight ` +
    `together, expect a count over the horizon outside its ${Math.round(100 * level)} % interval of ${lower} to ${upper} (${named})`;
  return [{ code: 'choice-outside-interval', severity: 'warning', message }];
}

/** A currency is set, and in some periods no cost is in force. */
export function costFinding(currency: string | null, periods: readonly ForecastPeriod[]): Finding[] {
  const without = periods.filter(({ expectedCost }) => expectedCost === null);
  if (currency === null || without.length === 0) return [];
  const named = without.map(({ period }) => period).join(', ');
  const message = `no cost per return is in force in ${named}, so the expected cost holds the other periods only`;
  return [{ code: 'cost-incomplete', severity: 'warning', message }];
}
