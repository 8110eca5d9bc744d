import type { ForecastDocument, ForecastProduct, PredictedCount } from '../../records.js';
import { intervalText, levelText } from './forecast.js';
import { nameOf } from './names.js';
import { alignColumns, countText, shorten } from './text.js';

type Block = Pick<ForecastDocument['total'] | ForecastProduct, 'periods' | 'untilWarrantyEnds'>;

/** The numbers that a month end is about: next period, horizon and until warranty ends, in total and by product. */
export function headlineText(document: ForecastDocument): string {
  const { total, products } = document;
  const names =
    total.productsIncluded.length === 1 ? '1 product' : `${total.productsIncluded.length} products`;
  const lines = headlines(document, total).map(({ label, count }) => {
    const intervals = document.levels.map((level) => `${levelText(level)}: ${intervalText(count, level)}`);
    return [`  ${label}`, countText(count.expected), `(${intervals.join('; ')})`];
  });
  const title = `expected returns of ${names}${document.asOf === null ? '' : ` after ${document.asOf}`}`;
  const sentences = [title, ...alignColumns(lines, ['left', 'right', 'left']), ...plannedNote(document)];
  return `${[...sentences, ...(products.length > 1 ? ['', ...byProduct(document)] : [])].join('\n')}\n`;
}

/** Why the horizon may be more than what is still to come until warranty ends. */
function plannedNote({ total }: ForecastDocument): string[] {
  const planned = total.periods.reduce((sum, period) => sum + period.planned.expected, 0);
  if (planned === 0 || total.untilWarrantyEnds === null) return [];
  return [
    `  planned shipments bring ${countText(planned)} of them; until warranty ends is of units shipped so far only`,
  ];
}

/** One row a product, with the widest interval asked for. */
function byProduct(document: ForecastDocument): string[] {
  const level = document.levels.at(-1) ?? 0.95;
  const labels = headlines(document, document.total).map(({ label }) => label);
  const head = ['by product', ...labels.flatMap((label) => [label, levelText(level)])];
  const rows = document.products.map((product) => [
    shorten(nameOf(product), 24),
    ...(product.notForecast === null
      ? headlines(document, product).flatMap(({ count }) => [
          countText(count.expected),
          intervalText(count, level),
        ])
      : ['not forecast']),
  ]);
  return alignColumns([head, ...rows], ['left', ...head.slice(1).map(() => 'right' as const)]);
}

function headlines({ asOf }: ForecastDocument, block: Block): { label: string; count: PredictedCount }[] {
  // Without a calendar the periods are steps of use, counted from one.
  const name = (period: string) => (asOf === null ? `step ${period}` : period);
  const rest = block.periods.find((period) => period.partial);
  const next = block.periods.find((period) => !period.partial);
  const last = block.periods.at(-1);
  return [
    ...(rest === undefined ? [] : [{ label: `${rest.period} (rest)`, count: rest }]),
    ...(next === undefined ? [] : [{ label: name(next.period), count: next }]),
    ...(last === undefined || last === next
      ? []
      : [{ label: `through ${name(last.period)}`, count: last.cumulative }]),
    ...(block.untilWarrantyEnds === null
      ? []
      : [{ label: 'until warranty ends', count: block.untilWarrantyEnds }]),
  ];
}
