/** View of pages/index.hbs: the whole portfolio on one page. */
import type { ForecastTotal, PredictedCount } from '../records.js';
import { fileRows, settingEntries } from './account.js';
import { dateText } from './dates.js';
import { forecastChart } from './forecast-chart.js';
import { forecastTable, historyRows } from './forecast-table.js';
import { headline } from './headline.js';
import { intervalText } from './intervals.js';
import { countText, expectedText, moneyText, percentText } from './numbers.js';
import type { ProductParts, ReportInput } from './parts.js';
import { periodWords } from './period-words.js';
import { productDetail, productSummary } from './product-view.js';

/** @param singleFile puts everything of the product pages inside, and links to places on the page. */
export function indexView(input: ReportInput, products: readonly ProductParts[], singleFile: boolean) {
  const sections = products.map((parts) => (singleFile ? productDetail : productSummary)(input, parts));
  return {
    ...pageFrame(input),
    pageTitle: input.table.title,
    singleFile,
    total: input.forecast === null ? null : totalView(input, input.forecast.total),
    glance: glance(input, products),
    missing: missingByReason(products),
    products: sections,
    severalProducts: products.length > 1,
    findings: input.table.findings,
  };
}

/** What every page shows at its head and foot. */
export function pageFrame(input: ReportInput) {
  const { table } = input;
  const levels = input.forecast?.levels ?? input.settings.levels;
  return {
    title: table.title,
    asOf: table.asOf === null ? null : dateText(table.asOf),
    version: input.version,
    files: fileRows(table.files),
    settings: settingEntries(input),
    forecastMade: input.forecast !== null,
    levels: levels.map(percentText),
    firstLevel: percentText(levels[0] ?? null),
    seed: String(input.settings.seed),
  };
}

/** Products without a forecast, those with the same reason together. */
function missingByReason(products: readonly ProductParts[]) {
  const groups = new Map<string, { code: string; message: string; names: string[] }>();
  for (const { name, missing } of products) {
    if (missing === null) continue;
    const group = groups.get(missing.message) ?? { ...missing, names: [] };
    group.names.push(name);
    groups.set(missing.message, group);
  }
  return [...groups.values()].map(({ names, ...reason }) => ({ ...reason, names: names.join(', ') }));
}

function totalView(input: ReportInput, total: ForecastTotal) {
  const words = periodWords(input);
  const asOf = input.table.asOf === null ? null : dateText(input.table.asOf);
  const levels = input.forecast?.levels ?? input.settings.levels;
  const shared = { periods: total.periods, untilWarrantyEnds: total.untilWarrantyEnds, levels, words };
  return {
    headline: headline({ ...shared, asOf, costs: total.costs }),
    chart: forecastChart({
      ...shared,
      id: 'forecast-total',
      title: `Returns per ${words.per}, all products`,
      periodNoun: words.noun,
      history: total.history,
      asOf,
      periodText: words.name,
    }),
    table: forecastTable({ ...shared, currency: null }),
    history: historyRows(total.history, words),
    noun: words.noun,
    included: total.productsIncluded.length,
    left: total.productsMissing.length,
    all: total.productsIncluded.length + total.productsMissing.length,
  };
}

/** One row a product: units, returns so far, and the three answers. */
function glance(input: ReportInput, products: readonly ProductParts[]) {
  const words = periodWords(input);
  const { horizon, levels } = input.forecast ?? input.settings;
  const rows = products.map((parts) => {
    const periods = parts.forecast?.periods ?? [];
    return {
      name: parts.name,
      slug: parts.slug,
      units: countText(parts.table.units),
      returns: countText(parts.table.returns),
      returnedShare: percentText(parts.table.units === 0 ? null : parts.table.returns / parts.table.units),
      next: answer(
        periods.find((p) => !p.partial),
        levels,
      ),
      horizon: answer(periods.at(-1)?.cumulative, levels),
      until: answer(parts.forecast?.untilWarrantyEnds, levels),
      missing: parts.missing !== null,
      cost: moneyText(costOf(parts), parts.forecast?.currency ?? null),
    };
  });
  const limited = rows.some((row) => row.until !== null);
  const costed = products.some((parts) => costOf(parts) !== null);
  return {
    rows,
    costed,
    limited,
    span: limited ? 3 : 2,
    next: `Next ${words.noun}`,
    horizon: `Next ${horizon} ${words.noun}s`,
    level: percentText(levels[0] ?? null),
  };
}

function answer(count: PredictedCount | null | undefined, levels: readonly number[]) {
  if (count === null || count === undefined) return null;
  return { expected: expectedText(count.expected), interval: intervalText(count, levels[0] ?? 0) };
}

function costOf({ forecast }: ProductParts): number | null {
  const costs = (forecast?.periods ?? []).map((p) => p.expectedCost);
  if (costs.length === 0 || costs.includes(null)) return null;
  return costs.reduce<number>((sum, cost) => sum + (cost ?? 0), 0);
}
