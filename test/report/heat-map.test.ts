import { expect, test } from 'vitest';
import type { NevadaTable } from '../../src/records.js';
import { heatMap } from '../../src/report/heat-map.js';

/** One cohort of 1,000 units whose returns are given, so that a count is the rate per thousand. */
function tableOf(returned: readonly number[]): NevadaTable {
  const periods = returned.map((_, i) => `${2000 + i}-01`);
  const withdrawn = returned.map(() => 0);
  return {
    periods,
    rows: [{ shippedIn: '2000-01', from: 0, to: 31, shipped: 1000, returned, withdrawn, survivors: 0 }],
  };
}

test('the steps reach the 95th percentile of the rates, so that no more than a few cells share the darkest shade', () => {
  for (let most = 1; most <= 400; most += 1) {
    const rates = Array.from({ length: 40 }, (_, i) => ((i + 1) * most) / 40);
    const map = heatMap(tableOf(rates), 'month');
    const steps = (map?.legend.length ?? 0) - 2;
    expect(steps, `${most}`).toBeGreaterThanOrEqual(2);
    expect(steps, `${most}`).toBeLessThanOrEqual(5);
    const last = Number(/^[\d.]+/.exec(map?.legend.at(-1)?.label ?? '')?.[0]);
    const step = last / steps;
    expect(last + step, `${most}`).toBeGreaterThan(0.95 * most * 0.97);
    const darkest = map?.rows[0]?.cells.filter((cell) => cell.shade === String(steps + 1)).length ?? 0;
    expect(darkest, `${most}`).toBeLessThanOrEqual(16);
  }
});
