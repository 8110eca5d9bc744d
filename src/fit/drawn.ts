import type { Config } from '../config.js';
import { freeOf } from '../families/family.js';
import { familyNamed } from '../families/index.js';
import { familyLabel } from '../family-label.js';
import type { Finding, FitProduct, NotForecast, ParameterDraws, ProductRecords } from '../records.js';
import { parameterDraws } from './draws.js';
import { seedOf } from './product.js';
import { termsOf } from './terms.js';

/** AICc by which a candidate may be behind the chosen one and still stand in for it. */
const standIn = 10;

/**
 * The parameter draws that a product's intervals rest on: of the chosen candidate or, where its refits fail too often, of
 * the next best one that is not far behind, with a finding that says which. Without one the product is not forecast.
 */
export function drawsForForecast(
  config: Config,
  records: ProductRecords,
  fit: FitProduct,
): ParameterDraws | NotForecast {
  if (fit.notForecast !== null) return fit.notForecast;
  const terms = termsOf(config, records);
  const best = fit.candidates[0]?.aicc ?? Infinity;
  const near = fit.candidates.filter((c) => c.ruledOut === null && (c.aicc ?? Infinity) <= best + standIn);
  const skipped: string[] = [];
  for (const candidate of near) {
    const family = familyNamed(candidate.family);
    const centre = freeOf(family, candidate.parameters);
    const draws = parameterDraws(terms, family, centre, config.draws, seedOf(config, records));
    if (draws !== null) return { ...draws, findings: standInFinding(skipped, candidate.family) };
    skipped.push(familyLabel(candidate.family));
  }
  return {
    code: 'no-usable-draws',
    message: `${refused(skipped)}, and no other candidate is near enough to stand in`,
  };
}

function standInFinding(skipped: readonly string[], used: string): Finding[] {
  if (skipped.length === 0) return [];
  const message = `${refused(skipped)}; the forecast rests on the ${familyLabel(used)} distribution, the next best`;
  return [{ code: 'refits-failed', severity: 'warning', message }];
}

function refused(families: readonly string[]): string {
  return `more than 1 % of the refits to randomly weighted data failed for ${families.join(' and ')}, so no interval rests on it`;
}
