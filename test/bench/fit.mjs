/**
 * Speed of fitting and forecasting, on the built program: warm medians in milliseconds, and ratios within this run. Where R with
 * its package survival is installed, its survreg is timed on the same ages.
 */
import { execFileSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { dayNumber } from '../../dist/calendar.js';
import { cellProbability } from '../../dist/exposure/probability.js';
import { familyNamed } from '../../dist/families/index.js';
import { drawsForForecast } from '../../dist/fit/drawn.js';
import { fitFamilies, typicalAges } from '../../dist/fit/maximum.js';
import { fitProduct } from '../../dist/fit/product.js';
import { layTerms, termsOf } from '../../dist/fit/terms.js';
import { forecastProduct } from '../../dist/forecast/product.js';
import { binomialDraw } from '../../dist/math/binomial.js';
import { randomStream } from '../../dist/math/random.js';
import { resolveConfig } from '../../dist/settings.js';

const weibull = familyNamed('weibull');
const table = monthlyTable(800);
const dated = resolveConfig(null, { asOf: '2026-10-31', table: 'none.csv', warrantyMonths: '24' });
const plain = resolveConfig(null, { ages: 'none.csv' });

report(
  'Weibull fit, 36 cohorts of real months, from records (goal 5 ms)',
  warmMedian(() => weibullFit(dated, table)),
);
const aged = agedProduct(2000);
const agedMedian = warmMedian(() => weibullFit(plain, aged));
report('Weibull fit, 2,000 weighted ages (goal 2 ms)', agedMedian);
const inR = survreg(aged.ages);
if (inR === null) console.log('R with survival is not installed: no ratio to its survreg');
else report(`R survreg on the same 2,000 ages; ours takes ${(agedMedian / inR).toFixed(2)} of it`, inR);

const [once, hundredfold] = pairedMedians(
  () => whole(dated, table),
  () => whole(dated, timesHundred(table)),
);
report('fit and forecast, all candidates, 4,000 draws', once);
report(
  `the same with 100 times the units in the same cells: ${(hundredfold / once).toFixed(2)} times (goal 1.2)`,
  hundredfold,
);

function report(what, milliseconds) {
  console.log(`${what}: ${milliseconds.toFixed(2)} ms`);
}

function weibullFit(config, records) {
  const terms = termsOf(config, records);
  return fitFamilies({ terms, laid: layTerms(terms, 'fit'), ages: typicalAges(terms) }, [weibull]);
}

function whole(config, records) {
  const fit = fitProduct(config, records);
  return forecastProduct(config, records, fit, drawsForForecast(config, records, fit));
}

function warmMedian(work) {
  for (let i = 0; i < 30; i++) work();
  return median(Array.from({ length: 61 }, () => timed(work)));
}

/** Medians of two works taken in turn, so that a machine that drifts does not favour one. */
function pairedMedians(a, b) {
  a();
  b();
  const pairs = Array.from({ length: 7 }, () => [timed(a), timed(b)]);
  return [median(pairs.map(([x]) => x)), median(pairs.map(([, y]) => y))];
}

function timed(work) {
  const start = performance.now();
  work();
  return performance.now() - start;
}

function median(values) {
  return [...values].sort((x, y) => x - y)[values.length >> 1];
}

/** 36 months of shipments and returns drawn from a Weibull (1.35, 2400 days) under a warranty of two years. */
function monthlyTable(shipped) {
  const random = randomStream('bench');
  const months = Array.from({ length: 36 }, (_, i) => ({
    from: dayNumber(2023, 11 + i, 1),
    to: dayNumber(2023, 12 + i, 1),
  }));
  const life = { family: weibull, free: weibull.free([2400, 1.35]), delay: 0, limit: 730 };
  const returned = months.flatMap((cohort, i) => {
    let left = shipped;
    let rest = 1;
    return months.slice(i).flatMap((month) => {
      const chance = cellProbability(life, cohort, month);
      const quantity = binomialDraw(random, left, chance / rest);
      left -= quantity;
      rest -= chance;
      return quantity === 0 ? [] : [{ cohort: i, ...month, quantity }];
    });
  });
  return product({ resolution: 'period', cohorts: months.map((month) => ({ ...month, shipped })), returned });
}

function timesHundred(records) {
  const cohorts = records.cohorts.map((cohort) => ({ ...cohort, shipped: 100 * cohort.shipped }));
  const returned = records.returned.map((cell) => ({ ...cell, quantity: 100 * cell.quantity }));
  return { ...records, cohorts, returned };
}

function agedProduct(count) {
  const ages = Array.from({ length: count }, (_, i) => ({
    outcome: i % 5 === 0 ? 'returned' : 'surviving',
    from: 1 + 0.7 * i,
    to: 1 + 0.7 * i,
    exact: true,
    quantity: 1 + (i % 3),
  }));
  return product({ resolution: 'age', ages });
}

function product(parts) {
  const nothing = {
    segment: null,
    cohorts: [],
    returned: [],
    withdrawn: [],
    planned: [],
    ages: [],
    rejectedReturns: 0,
  };
  return { product: 'bench', unusable: null, ...nothing, ...parts };
}

/** Milliseconds of a survreg fit, the median of many, or null without R. */
function survreg(ages) {
  const file = join(tmpdir(), `returnfall-bench-${process.pid}.csv`);
  writeFileSync(
    file,
    `t,d,w\n${ages.map((g) => `${g.to},${g.outcome === 'returned' ? 1 : 0},${g.quantity}\n`).join('')}`,
  );
  const script =
    `x <- read.csv("${file}"); suppressMessages(library(survival)); ` +
    'f <- function() system.time(for (i in 1:20) survreg(Surv(t, d) ~ 1, data = x, weights = w))[["elapsed"]] / 20; ' +
    'invisible(f()); cat(1000 * median(replicate(7, f())))';
  try {
    return Number(
      execFileSync('Rscript', ['-e', script], { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] }),
    );
  } catch {
    return null;
  }
}
