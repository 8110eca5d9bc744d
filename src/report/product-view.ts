/** Views of one product: its section of the index, and its page. */
import { rulesOf } from '../config.js';
import type { Finding, ForecastProduct } from '../records.js';
import { productEntries } from './account.js';
import { candidateRows } from './candidates.js';
import { curvesChart } from './curves-chart.js';
import { dateText } from './dates.js';
import { forecastChart } from './forecast-chart.js';
import { forecastTable, historyRows } from './forecast-table.js';
import { headline } from './headline.js';
import { heatMap } from './heat-map.js';
import { countText, expectedText } from './numbers.js';
import type { ProductParts, ReportInput } from './parts.js';
import { type PeriodWords, periodWords } from './period-words.js';

/** Headline, chart and table: what a mailed report says of a product. */
export function productSummary(input: ReportInput, parts: ProductParts) {
  const words = periodWords(input);
  const { forecast } = parts;
  const levels = input.forecast?.levels ?? input.settings.levels;
  const asOf = input.table.asOf === null ? null : dateText(input.table.asOf);
  const shared = {
    periods: forecast?.periods ?? [],
    untilWarrantyEnds: forecast?.untilWarrantyEnds ?? null,
    levels,
    words,
  };
  return {
    name: parts.name,
    tableId: `table-${parts.slug}`,
    slug: parts.slug,
    href: `products/${parts.slug}.html`,
    missing: parts.missing,
    facts: facts(parts),
    headline: headline({ ...shared, asOf, costs: forecast === null ? [] : horizonCost(forecast) }),
    chart: forecastChart({
      ...shared,
      id: `forecast-${parts.slug}`,
      title: `Returns per ${words.per}`,
      periodNoun: words.noun,
      history: forecast?.history ?? [],
      asOf,
      periodText: words.name,
    }),
    table: forecastTable({ ...shared, currency: forecast?.currency ?? null }),
    history: historyRows(forecast?.history ?? [], words),
    noun: words.noun,
  };
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
    ageUnit: input.table.ageUnit,
    curves:
      fit === null ? null : curvesChart(`curves-${parts.slug}`, fit, calendar ? null : input.table.ageUnit),
    candidates: fit === null ? [] : candidateRows(fit, forecast?.byCandidate ?? [], input.table.ageUnit),
    untilWarranty: (forecast?.byCandidate ?? []).some((candidate) => candidate.untilWarrantyEnds !== null),
    horizonWords: horizonWords(input, words, forecast),
    findings: distinct([...(fit?.findings ?? []), ...(forecast?.findings ?? []), ...rejectedFinding(parts)]),
    entries: productEntries(table, rulesOf(input.settings, table.product), input.table.ageUnit),
    method: forecast?.method ?? null,
    draws: countText(forecast?.method?.draws ?? null),
    restarted: countText(forecast?.method?.restarted ?? null),
  };
}

function facts({ table }: ProductParts): string {
  const withdrawn = table.withdrawn === 0 ? '' : `, ${countText(table.withdrawn)} withdrawn`;
  const origin = table.table === null ? 'units' : 'units shipped';
  return `${countText(table.units)} ${origin}, ${countText(table.returns)} returned${withdrawn}, ${countText(table.survivors)} survivors.`;
}

function horizonCost({ periods, currency }: ForecastProduct) {
  const costs = periods.map((p) => p.expectedCost);
  if (currency === null || costs.length === 0 || costs.includes(null)) return [];
  return [{ currency, expectedCost: costs.reduce<number>((sum, cost) => sum + (cost ?? 0), 0) }];
}

/** Headings of the candidates' own returns; their first period may be the rest of one. */
function horizonWords(input: ReportInput, words: PeriodWords, forecast: ForecastProduct | null) {
  const { horizon } = input.forecast ?? input.settings;
  const first = forecast?.periods[0];
  const whole = `next ${horizon} ${words.noun}${horizon === 1 ? '' : 's'}`;
  if (first === undefined || !first.partial) return { next: `next ${words.noun}`, horizon: whole };
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
  const message = `if the rejected returns (${countText(table.rejectedReturns)}) were real, the forecast over the horizon would rise by about ${expectedText(rise)}`;
  return [{ code: 'rejected-returns', severity: 'note', message }];
}

function distinct(findings: readonly Finding[]): readonly Finding[] {
  const seen = new Map(findings.map((finding) => [`${finding.code} ${finding.message}`, finding]));
  return [...seen.values()];
}
