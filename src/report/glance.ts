/** One row a product: units, returns so far, and the answers. */
import type { PredictedCount } from '../records.js';
import { intervalText } from './intervals.js';
import { countText, expectedColumn, moneyColumn, percentColumn, percentText } from './numbers.js';
import type { ProductParts, ReportInput } from './parts.js';
import { type PeriodWords, periodWords } from './period-words.js';
import { horizonCost, productFindings } from './product-view.js';

/** View of partials/glance.hbs. */
export function glance(input: ReportInput, products: readonly ProductParts[]) {
  const { levels } = input.forecast ?? input.settings;
  const answersOf = {
    next: products.map(({ forecast }) => forecast?.periods.find((p) => !p.partial)),
    horizon: products.map(({ forecast }) => forecast?.periods.at(-1)?.cumulative),
    until: products.map(({ forecast }) => forecast?.untilWarrantyEnds),
  };
  const next = answers(answersOf.next, levels[0] ?? 0);
  const horizon = answers(answersOf.horizon, levels[0] ?? 0);
  const until = answers(answersOf.until, levels[0] ?? 0);
  const costs = products.map(({ forecast }) => horizonCost(forecast));
  const money = moneyColumn(costs.map((cost) => cost?.expectedCost ?? null));
  const share = ({ table }: ProductParts) => (table.units === 0 ? null : table.returns / table.units);
  const shareText = percentColumn(products.map(share));
  const limited = answersOf.until.some((count) => count !== null && count !== undefined);
  return {
    rows: products.map((parts, i) => ({
      name: parts.name,
      slug: parts.slug,
      warned: productFindings(parts).some((finding) => finding.severity === 'warning'),
      units: countText(parts.table.units),
      returns: countText(parts.table.returns),
      returnedShare: shareText(share(parts)),
      missing: parts.missing !== null,
      answers: [next[i], horizon[i], ...(limited ? [until[i]] : [])].map((answer) => answer ?? null),
      cost: money(costs[i]?.expectedCost ?? null, costs[i]?.currency ?? null),
    })),
    forecastMade: input.forecast !== null,
    costed: costs.some((cost) => cost !== null),
    limited,
    span: limited ? 3 : 2,
    ...headings(input, periodWords(input)),
    planned: products.some(({ forecast }) => forecast?.periods.some((p) => p.planned.expected > 0)),
    level: percentText(levels[0] ?? null),
  };
}

/** Where the rest of a period comes first, months are named: none is then simply the next. */
function headings(input: ReportInput, words: PeriodWords) {
  const periods = input.forecast?.total.periods ?? [];
  const until = `Until warranty ends, ${words.standing}`;
  const [first, second] = periods;
  const { horizon } = input.forecast ?? input.settings;
  if (first?.partial !== true)
    return { next: capital(words.next(1)), horizon: capital(words.next(horizon)), until };
  const whole = { periods: horizon, lastDay: periods.at(-1)?.to ?? null, partialFrom: first.from };
  const next = second === undefined ? words.next(1) : words.name(second.period, false);
  return { next: capital(next), horizon: capital(words.over(whole)), until };
}

function answers(counts: readonly (PredictedCount | null | undefined)[], level: number) {
  const expected = expectedColumn(counts.map((count) => count?.expected ?? null));
  return counts.map((count) =>
    count === null || count === undefined
      ? null
      : { expected: expected(count.expected), interval: intervalText(count, level) },
  );
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
