// Ingest of a fleet by unit against a bare csv-parse pass over the same two files, each in a process of its own.
// RETURNFALL_BENCH_ROWS: rows of shipments (5,000,000). RETURNFALL_BENCH_DIST: the built folder (dist).
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { closeSync, createReadStream, mkdtempSync, openSync, rmSync, statSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { basename, join, resolve } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));
const rows = Number(process.env.RETURNFALL_BENCH_ROWS ?? 5_000_000);
const dist = resolve(root, process.env.RETURNFALL_BENCH_DIST ?? 'dist');
const [task, folder] = process.argv.slice(2);

if (task === undefined) compare();
else await { bare, ingest: ingestAll }[task](folder);

function compare() {
  const made = mkdtempSync(join(tmpdir(), 'returnfall-bench-'));
  try {
    makeFiles(made);
    const pass = measure('bare', made);
    const full = measure('ingest', made);
    const ratio = (of) => (full[of] / pass[of]).toFixed(2);
    const figures = [
      `ingest of ${rows} unit rows: ${full.seconds.toFixed(1)} s, peak ${full.megabytes.toFixed(0)} MB (goal under 300)`,
      `bare csv-parse ${pass.seconds.toFixed(1)} s, peak ${pass.megabytes.toFixed(0)} MB`,
      `ratio ${ratio('seconds')} (goal at most 3), of processor time ${ratio('processor')}`,
    ];
    console.log(`${figures.join('; ')} [${full.note}]`);
  } finally {
    rmSync(made, { recursive: true });
  }
}

function measure(name, made) {
  const child = spawnSync(process.execPath, [fileURLToPath(import.meta.url), name, made], {
    encoding: 'utf8',
  });
  if (child.status !== 0) throw new Error(child.stderr);
  return JSON.parse(child.stdout);
}

function report(started, note) {
  const seconds = (performance.now() - started) / 1000;
  const { user, system } = process.cpuUsage();
  const processor = (user + system) / 1e6;
  console.log(JSON.stringify({ seconds, processor, megabytes: process.resourceUsage().maxRSS / 1024, note }));
}

// csv-parse as its manual shows it for streams, without an object or a callback of ours a row.
async function bare(made) {
  const { parse } = await import('csv-parse');
  const started = performance.now();
  let read = 0;
  for (const name of ['shipments.csv', 'returns.csv']) {
    const parser = createReadStream(join(made, name), { highWaterMark: 65536 }).pipe(parse());
    parser.on('data', () => read++);
    await new Promise((end, fail) => parser.on('end', end).on('error', fail));
  }
  report(started, `${read} rows`);
}

async function ingestAll(made) {
  const { ingest } = await import(pathToFileURL(join(dist, 'ingest/ingest.js')).href);
  const started = performance.now();
  const none = { files: [], columns: {}, dateFormat: null, encoding: null };
  const rules = { warrantyMonths: 24, warrantyDays: null, delayDays: 0, delayReason: null };
  const config = {
    asOf: '2026-10-31',
    period: 'month',
    maxRejectShare: 0.01,
    shipments: none,
    returns: none,
    withdrawals: none,
    plan: none,
    everyProduct: { ...rules, costPerReturn: [], currency: null },
    namedProducts: [],
  };
  const sources = { withdrawals: [], plan: [], table: [], 'table-withdrawn': [], ages: [] };
  sources.shipments = [sourceOf(join(made, 'shipments.csv'))];
  sources.returns = [sourceOf(join(made, 'returns.csv'))];
  const { products, files } = await ingest(config, sources, () => {});
  const units = products.flatMap(({ cohorts }) => cohorts).reduce((sum, { shipped }) => sum + shipped, 0);
  if (units !== rows) throw new Error(`${units} units of ${rows} were read`);
  const returns = products.flatMap(({ returned }) => returned).reduce((sum, cell) => sum + cell.quantity, 0);
  report(started, `${units} units, ${returns} returns, ${files[1].rejected} rejected`);
}

function sourceOf(path) {
  return {
    name: basename(path),
    open: () => createReadStream(path, { highWaterMark: 65536 }),
    digest: async () => {
      const hash = createHash('sha256');
      for await (const bytes of createReadStream(path, { highWaterMark: 65536 })) hash.update(bytes);
      return { bytes: statSync(path).size, sha256: hash.digest('hex') };
    },
  };
}

// Shipments of 39 bytes a row over three years, and one return in twenty of them, at most two years after.
function makeFiles(made) {
  const random = generator(20261031);
  const [first, days] = [Date.UTC(2023, 10, 1) / 86_400_000, 1096];
  const iso = (day) => new Date(day * 86_400_000).toISOString().slice(0, 10);
  const shipments = lineWriter(join(made, 'shipments.csv'), 'unit,product,ship_date');
  const returns = lineWriter(join(made, 'returns.csv'), 'unit,return_date');
  for (let i = 0; i < rows; i++) {
    const unit = `S${String(Math.imul(i, 7919) >>> 0).padStart(13, '0')}`;
    const day = first + Math.floor(random() * days);
    shipments.add(`${unit},PRODUCT-${String(Math.floor(random() * 40)).padStart(4, '0')},${iso(day)}`);
    if (i % 20 === 0)
      returns.add(`${unit},${iso(Math.min(day + Math.floor(random() * 700), first + days - 1))}`);
  }
  shipments.end();
  returns.end();
}

function lineWriter(path, header) {
  const file = openSync(path, 'w');
  let held = [header];
  const flush = () => {
    writeSync(file, `${held.join('\n')}\n`);
    held = [];
  };
  return {
    add: (line) => {
      held.push(line);
      if (held.length === 10_000) flush();
    },
    end: () => {
      if (held.length > 0) flush();
      closeSync(file);
    },
  };
}

// Mulberry32 (T. Ettinger, public domain, from memory): enough for made-up rows.
function generator(seed) {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
}
