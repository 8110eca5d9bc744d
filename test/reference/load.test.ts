import { describe, expect, it } from 'vitest';
import { near } from '../support/near.js';
import { loadCells, loadFits, loadGrouped, loadTails } from './load.js';

/** Identities that hold among the committed numbers, so that a slip of the hand in them is noticed. */
describe('the reference numbers', () => {
  const sum = (numbers: readonly number[]) => numbers.reduce((a, b) => a + b, 0);

  /** AICc and BIC with the number of returned units as sample size (Hurvich & Tsai 1989; Schwarz 1978). */
  function checkCriteria(
    fit: { parameters: object; logLikelihood: number; aicc: number; bic: number },
    returned: number,
  ): void {
    const k = Object.keys(fit.parameters).length;
    near(fit.aicc, -2 * fit.logLikelihood + 2 * k + (2 * k * (k + 1)) / (returned - k - 1), 'tail');
    near(fit.bic, -2 * fit.logLikelihood + k * Math.log(returned), 'tail');
  }

  it.each(loadFits())('of $name agree among themselves and with the printed values', (set) => {
    const returned = sum(set.ages.filter((a) => a.outcome === 'returned').map((a) => a.quantity));
    expect(set.fits).toHaveLength(5);
    for (const fit of set.fits) checkCriteria(fit, returned);
    for (const { family, parameters } of set.printed) {
      const fitted = set.fits.find((fit) => fit.family === family)?.parameters ?? {};
      for (const [name, value] of Object.entries(parameters)) {
        const digits = String(value).split('.')[1]?.length ?? 0;
        const half = 0.5 * 10 ** -digits;
        expect(Math.abs((fitted[name] ?? Number.NaN) - value), `${family} ${name}`).toBeLessThanOrEqual(half);
      }
    }
  });

  it('of the table add up', () => {
    const table = loadGrouped();
    const back = table.returned.map(sum);
    expect(table.survivors).toEqual(table.shipped.map((n, i) => n - (back[i] ?? 0)));
    expect([sum(table.shipped), sum(back)]).toEqual([15785, 510]);
    for (const fit of table.fits) {
      checkCriteria(fit, 510);
      fit.cellProbabilities.forEach((row, i) => {
        near(1 - sum(row), fit.survivorProbabilities[i] ?? Number.NaN, 'tail', `${fit.family} ${i}`);
      });
      near(sum(fit.expectedByMonth), fit.expectedTotal, 'tail');
      for (const one of [...fit.percentilesByMonth, fit.percentilesTotal]) {
        for (const [p, { cdf, cdfBelow }] of Object.entries(one)) {
          expect(cdfBelow < Number(p) && Number(p) <= cdf, `${fit.family} ${p}`).toBe(true);
        }
      }
    }
  });

  it('of the tails and cells are within their ranges', () => {
    for (const { rows } of loadTails()) {
      for (const row of rows) {
        near(row.logHazard, Math.log(row.hazard), 'tail');
        near(row.logDensity - row.logSurvival, row.logHazard, 'cellProbability');
        near(row.x, row.quantile, 'tail');
      }
    }
    for (const one of loadCells()) {
      expect(one.cellProbabilities).toHaveLength(one.cells.length);
      near(Math.log(one.survivorProbability), one.logSurvivorProbability, 'parameter', one.name);
      expect(sum(one.cellProbabilities) + one.survivorProbability).toBeLessThanOrEqual(1 + 1e-12);
    }
  });
});
