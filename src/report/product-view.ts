/** Views of one product: its section of the index, and its page. */
import { rulesOf } from '../config.js';
import type { FileAccount, Finding, ForecastPeriod, ForecastProduct, ForecastTotal } from '../records.js';
import { censorsReturns, productEntries } from './account.js';
import { candidateRows, parameterLevel } from './candidates.js';
import { curvesChart } from './curves-chart.js';
import { dateText } from './dates.js';
import { forecastChart } from './forecast-chart.js';
import { forecastTable, historyRows } from './forecast-table.js';
import { headline } from './headline.js';
import { heatMap } from './heat-map.js';
import { countText, expectedText } from './numbers.js';
import type { ProductParts, ReportInput } from './parts.js';
import { type PeriodWords, periodWords, plural } from './period-words.js';

/** Headline, chart and table: what a mailed report says of a product. */
export function productSummary(input: ReportInput, parts: ProductParts) {
  const words = periodWords(input);
  const { forecast } = parts;
  const levels = input.forecast?.levels ?? input.settings.levels;
  const asOf = input.table.asOf === null ? null : dateText(input.table.asOf);
  const periods = (forecast?.periods ?? []).map((p) => ({ ...p, costs: costsOf(p, forecast) }));
  const shared = {
    periods,
    untilWarrantyEnds: forecast?.untilWarrantyEnds ?? null,
    levels,
    words,
    asOf,
  };
  const cost = horizonCost(forecast);
  return {
    name: parts.name,
    tableId: `table-${parts.slug}`,
    findingsId: `findings-${parts.slug}`,
    slug: parts.slug,
    href: `products/${parts.slug}.html`,
    missing: parts.missing,
    facts: facts(parts, input.table.files),
    headline: headline({
      ...shared,
      costs: cost === null ? [] : [cost],
      costless: [],
      scope: null,
      survivors: parts.table.survivors,
    }),
    findings: productFindings(parts),
    chart:
      forecast?.notForecast === null
        ? forecastChart({
            ...shared,
            id: `forecast-${parts.slug}`,
            title: `Returns per ${words.per}`,
            history: forecast.history,
          })
        : null,
    table: forecastTable(shared),
    history: historyRows(forecast?.history ?? [], words),
    noun: words.noun,
  };
}

/** What a reader should know of the forecast of a product, from the fit, the forecast and the rejected rows. */
export function productFindings(parts: ProductParts): readonly Finding[] {
  const { fit, forecast } = parts;
  return distinct([...(fit?.findings ?? []), ...(forecast?.findings ?? []), ...rejectedFinding(parts)]);
}

/** Expected cost of a product over the horizon; null unless every period has one. */
export function horizonCost(forecast: ForecastProduct | null): ForecastTotal['costs'][number] | null {
  const costs = (forecast?.periods ?? []).map((p) => p.expectedCost);
  const currency = forecast?.currency ?? null;
  if (currency === null || costs.length === 0 || costs.includes(null)) return null;
  return { currency, expectedCost: costs.reduce<number>((sum, cost) => sum + (cost ?? 0), 0) };
}

/** Everything of a product's page. */
export function productDetail(input: ReportInput, parts: ProductParts) {
  const { fit, forecast, table } = parts;
  const words = periodWords(input);
  const calendar = input.table.asOf !== null;
  return {
    ...productSummary(input, parts),
    heatMap: table.table === null ? null : heatMap(table.table, words.noun),
    ages: ageRows(parts),
    ageUnits: plural(input.table.ageUnit),
    curves:
      fit === null ? null : curvesChart(`curves-${parts.slug}`, fit, calendar ? null : input.table.ageUnit),
    candidates: fit === null ? [] : candidateRows(fit, forecast?.byCandidate ?? [], input.table.ageUnit),
    standing: words.standing,
    untilWarranty: (forecast?.byCandidate ?? []).some((candidate) => candidate.untilWarrantyEnds !== null),
    horizonWords: horizonWords(input, words, forecast),
    parameterLevel: fit === null ? null : parameterLevel(fit),
    compared: (forecast?.byCandidate ?? []).length > 0,
    entries: productEntries(table, rulesOf(input.settings, table.product), input.table),
    method: forecast?.method ?? null,
    draws: countText(forecast?.method?.draws ?? null),
    restarted: countText(forecast?.method?.restarted ?? null),
  };
}

function facts({ table }: ProductParts, files: readonly FileAccount[]): string {
  const why = censorsReturns(files) ? ' or censored where a return was set aside' : '';
  const withdrawn = table.withdrawn === 0 ? '' : `, ${countText(table.withdrawn)} withdrawn${why}`;
  const origin = table.table === null ? 'units' : 'units shipped';
  return `${countText(table.units)} ${origin}, ${countText(table.returns)} returned${withdrawn}, ${countText(table.survivors)} survivors.`;
}

function costsOf({ expectedCost }: ForecastPeriod, forecast: ForecastProduct | null): ForecastTotal['costs'] {
  const currency = forecast?.currency ?? null;
  return currency === null || expectedCost === null ? [] : [{ currency, expectedCost }];
}

/** Headings of the candidates' own returns; their first period may be the rest of one. */
function horizonWords(input: ReportInput, words: PeriodWords, forecast: ForecastProduct | null) {
  const whole = words.next((input.forecast ?? input.settings).horizon);
  const first = forecast?.periods[0];
  if (first === undefined || !first.partial) return { next: words.next(1), horizon: whole };
  return { next: words.name(first.period, true), horizon: `with the ${whole}` };
}

function ageRows({ table }: ProductParts) {
  return table.ages.map((group) => ({
    outcome: group.outcome,
    age:
      group.from === group.to ? countText(group.from) : `${countText(group.from)} to ${countText(group.to)}`,
    quantity: countText(group.quantity),
  }));
}

function rejectedFinding({ table, forecast }: ProductParts): readonly Finding[] {
  const rise = forecast?.ifRejectedWereReal ?? null;
  if (rise === null || table.rejectedReturns === 0) return [];
  const much = rise < 0.05 ? 'less than 0.1' : `about ${expectedText(rise)}`;
  const message = `if the rejected returns (${countText(table.rejectedReturns)}) were real, the forecast over the horizon would rise by ${much}`;
  return [{ code: 'rejected-returns', severity: 'note', message }];
}

function distinct(findings: readonly Finding[]): readonly Finding[] {
  const seen = new Map(findings.map((finding) => [`${finding.code} ${finding.message}`, finding]));
  return [...seen.values()];
}
