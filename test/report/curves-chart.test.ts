import { expect, test } from 'vitest';
import type { FitProduct } from '../../src/records.js';
import { curvesChart } from '../../src/report/curves-chart.js';
import { reportInput } from '../support/report-input.js';

test('the interval of the nonparametric estimate is named by the level that the fit gives', () => {
  const fit = reportInput().fit?.products[0] as FitProduct;
  const chart = curvesChart('c', { ...fit, nonparametricLevel: 0.9 }, null);
  expect(chart?.level).toBe('90\u00a0%');
  expect(chart?.description).toContain('90\u00a0% interval');
  expect(chart?.legend[0]?.label).toContain('90\u00a0% interval');
});
