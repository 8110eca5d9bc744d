/** View of pages/index.hbs: the whole portfolio on one page. */
import { censorsReturns, fileRows, settingEntries } from './account.js';
import { dateText } from './dates.js';
import { glance } from './glance.js';
import { percentText } from './numbers.js';
import type { ProductParts, ReportInput } from './parts.js';
import { productDetail, productSummary } from './product-view.js';
import { totalView } from './total-view.js';

/** @param singleFile puts everything of the product pages inside, and links to places on the page. */
export function indexView(input: ReportInput, products: readonly ProductParts[], singleFile: boolean) {
  const sections = products.map((parts) => (singleFile ? productDetail : productSummary)(input, parts));
  return {
    ...pageFrame(input),
    pageTitle: input.table.title,
    singleFile,
    total: input.forecast === null ? null : totalView(input, input.forecast.total, products),
    unstepped: input.fit !== null && input.table.asOf === null && input.settings.ageStep === null,
    glance: products.length > 1 ? glance(input, products) : null,
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
    censored: censorsReturns(table.files),
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
