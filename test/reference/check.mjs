/**
 * Compares what make.R and make.py print with the committed numbers: node check.mjs made-by-r.json made-by-python.json
 * Shows the largest difference of each kind of number; ends with 1 when one is above what the tests allow.
 */
import { readFileSync } from 'node:fs';

/** As in test/support/near.ts: relative, and absolute for log likelihoods. Counts have to be equal. */
const allowed = {
  parameters: 1e-6,
  standardErrors: 1e-4,
  logLikelihood: 1e-7,
  intervals95: 1e-4,
  cellProbabilities: 1e-9,
  survivorProbabilities: 1e-9,
  expectedByMonth: 1e-6,
  expectedTotal: 1e-6,
  varianceTotal: 1e-6,
  count: 0,
  cdf: 1e-6,
  cdfBelow: 1e-6,
  tails: 1e-10,
};

const here = (name) => new URL(name, import.meta.url);
const read = (place) => JSON.parse(readFileSync(place, 'utf8'));
const fits = read(here('fits.json')).dataSets.flatMap((set) =>
  set.fits.map((fit) => [`${set.name} ${fit.family}`, fit]),
);
const grouped = read(here('grouped.json')).fits.map((fit) => [fit.family, fit]);
const tails = read(here('tails.json'));
const tailRows = tails.families.map((one) =>
  one.rows.map((row) => Object.fromEntries(tails.columns.map((name, i) => [name, row[i]]))),
);
const committed = {
  fits: Object.fromEntries(fits),
  grouped: Object.fromEntries(grouped),
  tails: { tails: tailRows },
};

for (const file of process.argv.slice(2)) {
  const { tool, ...made } = read(file);
  console.log(tool);
  if (made.tails !== undefined) made.tails = { tails: made.tails };
  for (const [topic, answers] of Object.entries(made)) report(topic, compare(answers, committed[topic]));
}

function report(topic, worst) {
  for (const [kind, { difference, compared }] of worst) {
    const bad = !(difference <= allowed[kind]);
    console.log(
      `  ${topic} ${kind}: ${compared} numbers, at most ${difference.toExponential(1)} apart${bad ? ', TOO FAR' : ''}`,
    );
    if (bad) process.exitCode = 1;
  }
}

/** The largest difference by kind; the kind of a number is the nearest name above it that has a tolerance. */
function compare(made, known, kind = null, worst = new Map()) {
  for (const [key, value] of Object.entries(made)) {
    const own = key in allowed ? key : kind;
    if (typeof value === 'object') compare(value, known?.[key] ?? {}, own, worst);
    else note(worst, own, distance(own, value, known?.[key]));
  }
  return worst;
}

function note(worst, kind, difference) {
  const so = worst.get(kind) ?? { difference: 0, compared: 0 };
  const larger = Number.isNaN(difference) ? Number.NaN : Math.max(so.difference, difference);
  worst.set(kind, { difference: larger, compared: so.compared + 1 });
}

function distance(kind, made, known) {
  if (made === known) return 0;
  return Math.abs(made - known) / (kind === 'logLikelihood' ? 1 : Math.abs(known));
}
