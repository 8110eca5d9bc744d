import type { Config } from '../config.js';
import { intervalKeys } from '../quantiles.js';
import type { CandidateForecast, Finding, ForecastPeriod } from '../records.js';

/** Weight of the candidates outside the interval from which on it is worth a warning. */
const noticedWeight = 0.1;

/** The mean of the predictive distribution and the plug-in figure differ by more than 5 % over the horizon (SPEC 5). */
export function plugInFinding(periods: readonly ForecastPeriod[]): Finding[] {
  const last = periods.at(-1)?.cumulative;
  if (last === undefined || Math.abs(last.expected - last.plugIn) <= 0.05 * last.plugIn) return [];
  const percent = Math.round(100 * (last.expected / last.plugIn - 1));
  const message =
    `the mean over the uncertainty of the parameters is ${Math.abs(percent)} % ${percent < 0 ? 'below' : 'above'} the forecast at their best values, ` +
    'because few returns leave the parameters wide open';
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
  const named = outside.map(({ family, horizon }) => `${family} ${Math.round(horizon)}`).join(', ');
  const message =
    `the interval takes the ${chosen} distribution as right; other candidates, with ${Math.round(100 * weight)} % of the weight ` +
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
