/**
 * Source: test/reference/warranty.json, invented records with a warranty limit, withdrawals, a delay and a plan; expected
 * returns, returns until warranty ends and the fitted line of the history at given parameters, in closed form
 * with mpmath and by quadrature with SciPy, which agree to 1e-11.
 */
import { describe, expect, test } from 'vitest';
import { exposedCohorts } from '../../src/forecast/cohorts.js';
import { forecastColumns } from '../../src/forecast/columns.js';
import { predictiveCounts } from '../../src/forecast/counts.js';
import { expectation } from '../../src/forecast/exposed.js';
import { historyOf } from '../../src/forecast/history.js';
import { columnOf } from '../../src/forecast/summary.js';
import type { ParameterDraws } from '../../src/records.js';
import { loadWarranty } from '../reference/load.js';
import { near } from '../support/near.js';
import { givenLife, scenarioConfig, scenarioRecords } from '../support/warranty.js';

const draws = 4000;

describe.each(loadWarranty())('$name', (scenario) => {
  const config = scenarioConfig(scenario);
  const records = scenarioRecords(scenario);
  const columns = forecastColumns(config);

  test('the periods ahead', () => {
    expect(columns.map(({ days }) => [days.from, days.to])).toEqual(scenario.ahead);
  });

  describe.each(scenario.answers)('$family', (answer) => {
    const { family, free } = givenLife(answer);

    test('expected returns, their planned part, and until warranty ends', () => {
      const exposed = exposedCohorts(config, records, columns, 'fit');
      const expected = expectation(exposed, exposed.chances(family.jetsAt(free)));
      expect(exposed.limited).toBe(true);
      expect(expected.periods.length).toBe(answer.expected.length);
      answer.expected.forEach((value, j) => {
        near(expected.periods[j], value, 'expectedReturns', `period ${j}`);
        near(expected.planned[j], answer.planned[j] as number, 'expectedReturns', `plan in period ${j}`);
      });
      near(expected.untilWarrantyEnds, answer.untilWarrantyEnds, 'expectedReturns', 'until warranty ends');
    });

    test('the counts until warranty ends have the mean and the variance of the sum of binomials', () => {
      const parameters: ParameterDraws = {
        family: family.name,
        free: Float64Array.from({ length: draws * free.length }, (_, i) => free[i % free.length] as number),
        k: free.length,
        kind: 'direct',
        restarted: 0,
        seed: ['until'],
        findings: [],
      };
      const exposed = exposedCohorts(config, records, columns, 'draw');
      const { counts, columns: width } = predictiveCounts(exposed, parameters);
      const until = columnOf(counts, width, width - 1);
      const mean = until.reduce((sum, x) => sum + x, 0) / draws;
      const variance = until.reduce((sum, x) => sum + (x - mean) ** 2, 0) / draws;
      const standardError = Math.sqrt(answer.untilWarrantyEndsVariance / draws);
      expect(Math.abs(mean - answer.untilWarrantyEnds)).toBeLessThan(4 * standardError);
      /** The variance of a nearly normal count has a relative standard error of √(2 / draws). */
      expect(Math.abs(variance / answer.untilWarrantyEndsVariance - 1)).toBeLessThan(
        4 * Math.sqrt(2 / draws),
      );
    });

    test("the history's shipped, returned and fitted", () => {
      const history = historyOf(config, records, { family, free });
      const held = (ends: readonly (readonly number[])[], [from, to]: readonly number[]) =>
        ends.filter(([end]) => (end as number) > (from as number) && (end as number) <= (to as number));
      const sum = (cells: readonly (readonly number[])[]) => cells.reduce((n, [, q]) => n + (q as number), 0);
      expect(history.length).toBe(scenario.past.length);
      scenario.past.forEach((range, j) => {
        const { shipped, returned, fitted } = history[j] as (typeof history)[number];
        expect(shipped).toBe(
          sum(
            held(
              scenario.cohorts.map(([, to, n]) => [to, n]),
              range,
            ),
          ),
        );
        expect(returned).toBe(
          sum(
            held(
              scenario.returned.map(([, , to, n]) => [to, n]),
              range,
            ),
          ),
        );
        near(fitted, answer.fitted[j] as number, 'expectedReturns', `period ${j}`);
      });
    });
  });
});
