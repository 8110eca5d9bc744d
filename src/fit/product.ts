import { daysPerMonth } from '../calendar.js';
import { type Config, cutOffOf, rulesOf } from '../config.js';
import { productCounts } from '../counts.js';
import { freeOf } from '../families/family.js';
import { familyNamed } from '../families/index.js';
import { familyLabel } from '../family-label.js';
import type { CandidateFit, Curve, FitProduct, NotForecast, ProductRecords } from '../records.js';
import { rankCandidates } from './choice.js';
import { betterRuledOut, leavesEstimate, ruledOutAhead, steepShape } from './findings.js';
import { binWidth } from './kernels.js';
import { fitFamilies, typicalAges } from './maximum.js';
import { nonparametricEstimate, nonparametricLevel } from './nonparametric.js';
import { withChosenShares } from './selection.js';
import { layTerms, type Terms, termsOf } from './terms.js';

/** Refits behind `chosenShare`. */
const selectionRefits = 200;
const curveSteps = 60;

/** Fits every candidate to one product, ranks them and chooses one; what cannot be forecast says why. */
export function fitProduct(config: Config, records: ProductRecords): FitProduct {
  const terms = termsOf(config, records);
  const rules = rulesOf(config, records.product);
  const oldestAge = oldestAgeOf(config, records);
  const candidates = terms.returns === 0 ? [] : fitCandidates(config, records, terms);
  const notForecast = reasonNot(records, terms, candidates);
  const nonparametric = nonparametricEstimate(config, records);
  return {
    ...productCounts(records),
    oldestAge,
    delayDays: rules.delayDays,
    delayReason: rules.delayReason,
    warrantyMonths: rules.warrantyMonths,
    warrantyDays: rules.warrantyDays,
    chosen: notForecast === null ? (candidates[0]?.family ?? null) : null,
    notForecast,
    findings: [
      ...steepShape(candidates),
      ...ruledOutAhead(candidates),
      ...leavesEstimate(candidates[0], nonparametric, rules.delayDays, roughUntil(config, records)),
    ],
    candidates,
    nonparametric,
    nonparametricLevel,
    curves: candidates
      .filter((candidate) => candidate.converged)
      .map((candidate) => curve(candidate, oldestAge, rules.delayDays, records.resolution !== 'age')),
  };
}

/** The seed words of a product's random numbers: they depend on nothing but the seed and the product itself. */
export function seedOf(config: Config, records: ProductRecords): (string | number)[] {
  return [config.seed, records.product, JSON.stringify(records.segment)];
}

function fitCandidates(config: Config, records: ProductRecords, terms: Terms): CandidateFit[] {
  const problem = { terms, laid: layTerms(terms, 'fit'), ages: typicalAges(terms) };
  const ranked = rankCandidates(fitFamilies(problem, config.candidates.map(familyNamed)), terms.returns);
  return withChosenShares(terms, ranked, selectionRefits, seedOf(config, records));
}

function reasonNot(
  records: ProductRecords,
  terms: Terms,
  candidates: readonly CandidateFit[],
): NotForecast | null {
  if (records.unusable !== null) return records.unusable;
  if (terms.returns === 0) {
    const message =
      'no returns in the records, so nothing can be fitted; forecast it by hand or with a similar product';
    return { code: 'no-returns', message };
  }
  if (candidates.some((candidate) => candidate.ruledOut === null)) return misleading(candidates);
  const few = candidates.every((candidate) => candidate.ruledOut?.code === 'too-few-returns');
  const reasons = [...new Set(candidates.map((candidate) => candidate.ruledOut?.message))].join('; ');
  return few
    ? {
        code: 'too-few-returns',
        message: `only ${terms.returns} ${terms.returns === 1 ? 'return' : 'returns'}, too few for any candidate; wait for more or record similar products as one`,
      }
    : { code: 'no-usable-fit', message: `every candidate is ruled out: ${reasons}` };
}

/** A candidate that was ruled out follows the records so much better that a forecast from the others would mislead. */
function misleading(candidates: readonly CandidateFit[]): NotForecast | null {
  const better = betterRuledOut(candidates);
  if (better === null || !better.forbids) return null;
  const { candidate, by } = better;
  const message =
    `the ${familyLabel(candidate.family)} distribution was ruled out (${candidate.ruledOut?.message}), and what is left follows the ` +
    `records far worse, by ${by.toFixed(1)} in log likelihood; look at the records, or wait for more of them`;
  return { code: 'best-fit-ruled-out', message };
}

/** Two months, or bins, where ages come from dates, which know them to the cohort and the cell only. */
function roughUntil(config: Config, records: ProductRecords): number {
  return records.resolution === 'age' ? 0 : 2 * Math.max(daysPerMonth, binWidth(config, records));
}

function oldestAgeOf(config: Config, records: ProductRecords): number {
  if (records.resolution === 'age')
    return records.ages.reduce((oldest, group) => Math.max(oldest, group.to), 0);
  const first = records.cohorts[0];
  return first === undefined ? 0 : cutOffOf(config) - first.from;
}

/**
 * Share returned by age, from 0 to one and a half times the oldest age: in steps of half months, or of as many as give
 * about sixty points; without a calendar sixty equal steps.
 */
function curve(candidate: CandidateFit, oldestAge: number, delay: number, dated: boolean): Curve {
  const family = familyNamed(candidate.family);
  const life = family.at(freeOf(family, candidate.parameters));
  const end = 1.5 * oldestAge;
  const half = 0.5 * daysPerMonth;
  const step = dated ? half * Math.ceil(end / half / curveSteps) : end / curveSteps;
  const ages = Array.from({ length: step > 0 ? Math.ceil(end / step - 1e-9) + 1 : 1 }, (_, i) => i * step);
  const probability = ages.map((age) => (age > delay ? Math.exp(life.logCdf(age - delay)) : 0));
  return { family: candidate.family, atRisk: candidate.atRisk, ages, probability };
}
