import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { rules, sourceFile } from './support/import-rules.js';

const src = fileURLToPath(new URL('../src/', import.meta.url));
const files = readdirSync(src, { recursive: true, encoding: 'utf8' })
  .map((name) => name.replaceAll('\\', '/'))
  .filter((name) => name.endsWith('.ts'))
  .sort()
  .map((name) => sourceFile(name, readFileSync(src + name, 'utf8')));

/** For each rule, files that break it. */
const broken: Readonly<Record<string, readonly (readonly [path: string, text: string])[]>> = {
  'no stage imports another': [
    ['fit/a.ts', "import { x } from '../forecast/b.js';"],
    ['ingest/deep/a.ts', "export type { X } from '../../ledger/b.js';"],
    ['reserve/a.ts', "type X = import('../assess/b.js').X;"],
    ['forecast/a.ts', "import {\n  x, // the one\n  y,\n} from '../fit/b.js';"],
  ],
  'report imports neither fit, forecast nor families': [
    ['report/a.ts', "import type { X } from '../forecast/b.js';"],
    ['report/a.ts', "const { fit } = await import('../fit/b.js');"],
    ['report/charts/a.ts', "import { weibull } from '../../families/weibull.js';"],
  ],
  'only pipeline.ts, index.ts and cli/ import stages': [
    ['records.ts', "import type { Draws } from './fit/draws.js';"],
    ['families/a.ts', "import { likelihood } from '../fit/likelihood.js';"],
  ],
  'no stage imports the pipeline or the index': [
    ['fit/a.ts', "import type { Effects } from '../pipeline.js';"],
    ['families/a.ts', "import { x } from '../index.js';"],
  ],
  'math/ imports only math/': [
    ['math/a.ts', "import type { Cohort } from '../records.js';"],
    ['math/a.ts', "import { createHash } from 'node:crypto';"],
  ],
  'families/ imports only families/, math/ and the shared contracts': [
    ['families/a.ts', "import type { Cell } from '../records.js';"],
    ['families/a.ts', "import type { Config } from '../config.js';"],
  ],
  'cli/ is imported by nobody': [
    ['pipeline.ts', "import { realEffects } from './cli/effects.js';"],
    ['ledger/a.ts', "import { write } from '../cli/files.js';"],
  ],
  'only cli/ touches files, processes and threads': [
    ['ingest/a.ts', "import { readFile } from 'node:fs/promises';"],
    ['ingest/a.ts', "import fs from 'fs';"],
    ['fit/a.ts', "import { Worker } from 'node:worker_threads';"],
    ['fit/a.ts', "const os = require('node:os');"],
    ['report/a.ts', "const tz = process.env['TZ'];"],
    ['report/a.ts', 'const tz = globalThis.process?.env;'],
    ['report/a.ts', "const zone = 'TZ' in process.env;"],
  ],
  'only cli/ knows the clock': [
    ['report/a.ts', 'const now = new Date();'],
    ['report/a.ts', 'const now = new Date;'],
    ['ledger/a.ts', 'const now = Date.now();'],
    ['fit/a.ts', 'const start = performance.now();'],
  ],
  'nothing depends on chance, locale or time zone': [
    ['math/a.ts', 'const u = Math.random();'],
    ['report/a.ts', 'const text = count.toLocaleString();'],
    ['report/a.ts', 'const format = new Intl.NumberFormat();'],
    ['report/a.ts', 'const format = new Intl.NumberFormat(undefined, options);'],
    ['report/a.ts', "const format = new Intl.DateTimeFormat('en');"],
    ['ingest/a.ts', 'names.sort((a, b) => a.localeCompare(b));'],
    ['cli/a.ts', 'const text = day.toLocaleDateString();'],
  ],
  'src/ imports nothing outside src/': [
    ['report/a.ts', "const page = new URL('../../templates/page.hbs', import.meta.url);"],
    ['config.ts', "import { near } from '../test/support/near.js';"],
    ['cli/a.ts', "const sample = new URL('../../sample-data/returns.csv', import.meta.url);"],
  ],
  'imports of our own files end in .js': [
    ['fit/a.ts', "import { x } from './b';"],
    ['fit/a.ts', "import { x } from './b.ts';"],
  ],
};

/** Files that break no rule. */
const sound: readonly (readonly [path: string, text: string])[] = [
  [
    'pipeline.ts',
    "import { fitProduct } from './fit/product.js';\nimport type { Config } from './config.js';",
  ],
  ['index.ts', "export { monthEnd } from './pipeline.js';\nexport { fit } from './fit/product.js';"],
  ['cli/b.ts', "const page = new URL('../../templates/page.hbs', import.meta.url);"],
  ['cli/a.ts', "import { readFile } from 'node:fs/promises';\nconst now = Date.now() + process.pid;"],
  ['ingest/a.ts', "import { UTCDate } from '@date-fns/utc';\nimport { Readable } from 'node:stream';"],
  ['ingest/b.ts', 'const day = new Date(0).getTime(); // not new Date(), not process.env'],
  ['fit/a.ts', "import { root } from '../math/root.js';\nimport { weibull } from '../families/weibull.js';"],
  ['fit/b.ts', "const text = 'import x from ../forecast/b.js; process.exit()';"],
  ['math/a.ts', "/** import { x } from '../fit/b.js' */\nimport jstat from 'jstat';"],
  ['ledger/a.ts', "const format = new Intl.NumberFormat('en', { style: 'currency' });"],
  ['report/a.ts', "import { line } from 'd3-shape';\nimport type { FitDocument } from '../records.js';"],
];

describe('the rules of the house', () => {
  it('are read over all files', () => {
    expect(files.length).toBeGreaterThan(5);
    const pipeline = files.find((file) => file.path === 'pipeline.ts');
    expect(pipeline?.imports.map((one) => one.resolved)).toContain('fit/product.js');
  });

  for (const rule of rules) {
    it(`${rule.name}`, () => {
      const found = files.flatMap((file) => rule.breaches(file).map((what) => `src/${file.path} ${what}`));
      expect(found, `${rule.name}: ${rule.reason}`).toEqual([]);
    });

    it(`bites: ${rule.name}`, () => {
      const fixtures = broken[rule.name] ?? [];
      expect(fixtures.length).toBeGreaterThan(0);
      for (const [path, text] of fixtures) {
        expect(rule.breaches(sourceFile(path, text)), `${path}: ${text}`).toHaveLength(1);
      }
    });
  }

  it('leave sound files alone', () => {
    for (const [path, text] of sound) {
      const found = rules.flatMap((rule) => rule.breaches(sourceFile(path, text)));
      expect(found, `${path}: ${text}`).toEqual([]);
    }
  });
});
