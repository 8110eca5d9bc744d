/**
 * Source: test/reference/warranty.json, invented records with a warranty limit, withdrawals and a delay; the log
 * likelihood at given parameters in closed form with mpmath and by quadrature with SciPy, which agree to 1e-11.
 */
import { describe, expect, test } from 'vitest';
import { logLikelihood } from '../../src/fit/likelihood.js';
import { layTerms, termsOf } from '../../src/fit/terms.js';
import { loadWarranty } from '../reference/load.js';
import { near } from '../support/near.js';
import { givenLife, scenarioConfig, scenarioRecords } from '../support/warranty.js';

describe.each(loadWarranty())('$name', (scenario) => {
  const records = scenarioRecords(scenario);
  const terms = termsOf(scenarioConfig(scenario), records);

  test.each(scenario.answers)('log likelihood, $family', (answer) => {
    const { family, free } = givenLife(answer);
    const likelihood = logLikelihood(terms, layTerms(terms, 'fit'), family);
    near(likelihood.evaluate(free), answer.logLikelihood, 'logLikelihood');
  });

  test('every unit older than the delay is behind one term', () => {
    const youngest = scenario.cohorts.at(-1)?.[2] as number;
    const shipped = records.cohorts.reduce((sum, cohort) => sum + cohort.shipped, 0);
    const units = terms.counts.reduce((sum, count) => sum + count, 0);
    expect(units).toBe(shipped - (scenario.delayDays > 0 ? youngest : 0));
  });
});
