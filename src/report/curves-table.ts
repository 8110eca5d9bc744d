/** The numbers of the chart of curves. */
import type { FitProduct } from '../records.js';
import { candidateName } from './candidates.js';
import { ageColumn, countText, percentColumn } from './numbers.js';

/** Enough to follow a curve by its numbers. */
const mostCurveRows = 30;

/** The nonparametric estimate, a row a point. @param unitLength days in the unit that ages are shown in. */
export function pointRows({ nonparametric }: FitProduct, unitLength: number) {
  const age = ageColumn(nonparametric.map((point) => point.age / unitLength));
  const share = percentColumn(nonparametric.map((point) => point.probability));
  const bound = percentColumn(nonparametric.map((point) => point.upper));
  return nonparametric.map((point) => ({
    age: age(point.age / unitLength),
    probability: share(point.probability),
    interval: `${bound(point.lower)} to ${bound(point.upper)}`,
    atRisk: countText(point.atRisk),
  }));
}

/** The curves at no more than `mostCurveRows` of their ages up to `end`; null when they do not share them. */
export function curveTable({ curves }: FitProduct, unitLength: number, end: number) {
  const ages = (curves[0]?.ages ?? []).filter((age) => age / unitLength <= end);
  if (ages.length === 0 || curves.some((curve) => curve.ages.length !== curves[0]?.ages.length)) return null;
  const columns = curves.map((curve) => percentColumn(curve.probability.slice(0, ages.length)));
  const ageText = ageColumn(ages.map((age) => age / unitLength));
  const step = Math.ceil(ages.length / mostCurveRows);
  const rows = ages.flatMap((age, i) => {
    const shares = curves.map((curve, c) => columns[c]?.(curve.probability[i] ?? null) ?? '');
    return i % step === 0 || i === ages.length - 1 ? [{ age: ageText(age / unitLength), shares }] : [];
  });
  return { names: curves.map(candidateName), rows };
}
