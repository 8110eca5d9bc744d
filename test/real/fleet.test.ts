/**
 * A real fleet, found by RETURNFALL_FLEET (shipments.csv, returns.csv, withdrawn.csv; as-of date 2016-03-31). Source of the
 * check values: R's survival 3.5-3. On whole-day ages, survreg(Surv(pmax(days, 0.5), returned) ~ 1) gives the product
 * ST4000DM000 shape 1.09015, scale 9653.36; with the day of return as an interval and survivors watched to the end of the last
 * day, as here, survreg(Surv(days - 0.5, days + 0.5, type = "interval2") ~ 1) gives shape 1.087594, scale 9731.295.
 */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, expect, test } from 'vitest';
import type { FitDocument, ForecastDocument, IntakeDocument } from '../../src/records.js';

const fleet = process.env.RETURNFALL_FLEET;
const folder = mkdtempSync(join(tmpdir(), 'returnfall-fleet-'));
afterAll(() => rmSync(folder, { recursive: true }));

const main = new URL('../../dist/cli/main.js', import.meta.url).pathname;

function runFleet(from: string): (name: string) => unknown {
  const settings = join(folder, 'returnfall.json');
  const files = (name: string) => ({ files: [resolve(from, name)] });
  const wanted = {
    asOf: '2016-03-31',
    shipments: files('shipments.csv'),
    returns: files('returns.csv'),
    withdrawals: { ...files('withdrawn.csv'), columns: { date: 'withdrawn_date' } },
    draws: 500,
  };
  writeFileSync(settings, JSON.stringify(wanted));
  try {
    execFileSync('node', [main, 'run', '--settings', settings, '--out', join(folder, 'out'), '--quiet']);
    throw new Error('28 products cannot be forecast, so exit 4 is due');
  } catch (error) {
    expect((error as { status?: number }).status).toBe(4);
  }
  return (name) => JSON.parse(readFileSync(join(folder, 'out', name), 'utf8'));
}

test.skipIf(fleet === undefined)(
  'the fleet runs as a whole, and its largest product is where R puts it',
  () => {
    const read = runFleet(fleet as string);
    const intake = read('intake.json') as IntakeDocument;
    const sum = (of: 'units' | 'returns' | 'withdrawn') => intake.products.reduce((n, p) => n + p[of], 0);
    expect([intake.products.length, sum('units'), sum('returns'), sum('withdrawn')]).toEqual([
      53, 50921, 1516, 436,
    ]);
    const largest = (read('fit.json') as FitDocument).products.find((p) => p.product === 'ST4000DM000');
    const weibull = largest?.candidates.find((c) => c.family === 'weibull')?.parameters as {
      shape: number;
      scale: number;
    };
    expect(Math.abs(weibull.shape / 1.09015 - 1)).toBeLessThan(0.005);
    expect(Math.abs(weibull.scale / 9653.36 - 1)).toBeLessThan(0.01);
    expect(Math.abs(weibull.shape / 1.087594 - 1)).toBeLessThan(0.0005);
    expect(Math.abs(weibull.scale / 9731.295 - 1)).toBeLessThan(0.001);
    const forecast = read('forecast.json') as ForecastDocument;
    expect(forecast.total.productsIncluded.length + forecast.total.productsMissing.length).toBe(53);
    expect(forecast.total.periods).toHaveLength(12);
  },
);
