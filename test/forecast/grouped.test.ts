/**
 * Source: the grouped table of test/reference/grouped.json, computed in closed form with mpmath at 45 digits. The
 * percentiles are those of the plug-in count, a test of the arithmetic only: they hold no parameter uncertainty.
 */
import { describe, expect, test } from 'vitest';
import { familyNamed } from '../../src/families/index.js';
import { drawsForForecast } from '../../src/fit/drawn.js';
import { fitProduct } from '../../src/fit/product.js';
import { exposedCohorts } from '../../src/forecast/cohorts.js';
import { forecastColumns } from '../../src/forecast/columns.js';
import { forecastProduct } from '../../src/forecast/product.js';
import { loadGrouped } from '../reference/load.js';
import { configWith, groupedProduct } from '../support/data.js';
import { near } from '../support/near.js';
import { quantileOf, sumOfBinomials } from '../support/sum-of-binomials.js';

const table = loadGrouped();
const records = groupedProduct(table);
const config = configWith({ asOf: table.asOf, horizon: 6, draws: 400 });

describe.each(table.fits.map((fit) => ({ fit, name: fit.family })))(
  'grouped table v1, $name',
  ({ fit, name }) => {
    const family = familyNamed(name);
    const columns = forecastColumns(config);
    const exposed = exposedCohorts(config, records, columns, 'fit');
    const free = family.free(family.parameterNames.map((p) => fit.parameters[p] as number));
    const chances = Float64Array.from(exposed.chances(family.jetsAt(free)));

    test('expected returns of the next six months', () => {
      const single = configWith({ ...config, candidates: [name] });
      const fitted = fitProduct(single, records);
      const { product } = forecastProduct(single, records, fitted, drawsForForecast(single, records, fitted));
      expect(product.periods.map((p) => p.period)).toEqual(table.forecastMonths);
      product.periods.forEach((period, j) => {
        near(period.plugIn, fit.expectedByMonth[j] as number, 'expectedReturns', period.period);
      });
      near(product.periods.at(-1)?.cumulative.plugIn, fit.expectedTotal, 'expectedReturns', 'total');
    });

    test('exact percentiles of the plug-in count', () => {
      const upTo = (j: number) =>
        exposed.groups.map((g, i) => [g.units, chances[i * exposed.columns + j] as number] as const);
      fit.percentilesByMonth.forEach((percentiles, j) => {
        const distribution = sumOfBinomials(upTo(j));
        for (const [p, { count }] of Object.entries(percentiles)) {
          expect(quantileOf(distribution, Number(p)), `${table.forecastMonths[j]} ${p}`).toBe(count);
        }
      });
      const whole = exposed.groups.map((g, i) => {
        const row = chances.subarray(i * exposed.columns, i * exposed.columns + exposed.periods);
        return [g.units, row.reduce((sum, x) => sum + x, 0)] as const;
      });
      for (const [p, { count }] of Object.entries(fit.percentilesTotal)) {
        expect(quantileOf(sumOfBinomials(whole), Number(p)), `total ${p}`).toBe(count);
      }
    });
  },
);
