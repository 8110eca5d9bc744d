import type { Config } from '../config.js';
import { familyNamed } from '../families/index.js';
import type {
  CandidateFit,
  Finding,
  FitProduct,
  NotForecast,
  ParameterDraws,
  ProductRecords,
} from '../records.js';
import { parameterDraws } from './draws.js';
import { seedOf } from './product.js';
import { termsOf } from './terms.js';

/**
 * The parameter draws that a product's intervals rest on: of the chosen candidate or, where its refits fail too often, of
 * the next best one, with a finding that says so.
 */
export function drawsForForecast(
  config: Config,
  records: ProductRecords,
  fit: FitProduct,
): ParameterDraws | NotForecast {
  if (fit.notForecast !== null) return fit.notForecast;
  const terms = termsOf(config, records);
  const skipped: Finding[] = [];
  for (const candidate of fit.candidates.filter((c) => c.ruledOut === null)) {
    const family = familyNamed(candidate.family);
    const best = family.free(family.parameterNames.map((name) => candidate.parameters[name] as number));
    const draws = parameterDraws(terms, family, best, config.draws, seedOf(config, records));
    if (draws !== null) return { ...draws, findings: skipped };
    skipped.push(skippedFinding(candidate));
  }
  return { code: 'no-usable-draws', message: skipped.map((finding) => finding.message).join('; ') };
}

function skippedFinding(candidate: CandidateFit): Finding {
  const message = `more than 1 % of the refits of the ${candidate.family} distribution to randomly weighted data failed, so no interval rests on it`;
  return { code: 'refits-failed', severity: 'warning', message };
}
