import { intervalKeys } from '../../quantiles.js';
import type { ForecastDocument, ForecastProduct, PredictedCount } from '../../records.js';
import { nameOf } from './names.js';
import { type Align, alignColumns, countText, numberText, plainNumber, printable } from './text.js';

type Block = Pick<ForecastDocument['total'] | ForecastProduct, 'periods' | 'untilWarrantyEnds'>;

/** The forecast of every product and of all together, period by period, with intervals. */
export function forecastText(document: ForecastDocument): string {
  const blocks = document.products.map((product) => productLines(product, document.levels));
  if (document.products.length > 1) blocks.push(totalLines(document));
  return blocks.map((lines) => `${lines.join('\n')}\n`).join('\n');
}

/** `24 to 39`: the two-sided interval at `level`. */
export function intervalText(count: PredictedCount, level: number): string {
  const [lower, upper] = intervalKeys(level).map((key) => count.quantiles[key]);
  return lower === undefined || upper === undefined ? '-' : `${numberText(lower)} to ${numberText(upper)}`;
}

/** `80 %` */
export function levelText(level: number): string {
  return `${plainNumber(100 * level)} %`;
}

function productLines(product: ForecastProduct, levels: readonly number[]): string[] {
  const warnings = product.findings.map(({ severity, message }) => `${severity}: ${printable(message)}`);
  if (product.notForecast !== null) {
    return [`${nameOf(product)}: not forecast: ${printable(product.notForecast.message)}`, ...warnings];
  }
  const title = `${nameOf(product)}: expected returns, ${product.chosen ?? 'nothing'} chosen`;
  return [title, ...blockLines(product, levels), ...warnings];
}

function totalLines(document: ForecastDocument): string[] {
  const { productsIncluded, productsMissing } = document.total;
  const missing = productsMissing.map(printable).join(', ');
  return [
    `(total) of ${productsIncluded.length} ${productsIncluded.length === 1 ? 'product' : 'products'}${missing === '' ? '' : `, without ${missing}`}: expected returns`,
    ...blockLines(document.total, document.levels),
  ];
}

function blockLines(block: Block, levels: readonly number[]): string[] {
  const head = ['period', 'expected', ...levels.map(levelText), 'cumulative', ...levels.map(levelText)];
  const rows = block.periods.map((period) => [
    period.partial ? `${period.period} (rest)` : period.period,
    ...countCells(period, levels),
    ...countCells(period.cumulative, levels),
  ]);
  const end = block.untilWarrantyEnds;
  if (end !== null) rows.push(['until warranty ends', ...countCells(end, levels)]);
  const aligns: Align[] = ['left', ...Array<Align>(head.length - 1).fill('right')];
  return alignColumns([head, ...rows], aligns);
}

function countCells(count: PredictedCount, levels: readonly number[]): string[] {
  return [countText(count.expected), ...levels.map((level) => intervalText(count, level))];
}
