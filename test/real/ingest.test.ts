import { createReadStream, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { intakeDocument } from '../../src/ingest/document.js';
import { ingest } from '../../src/ingest/ingest.js';
import type { IntakeProduct, Source } from '../../src/records.js';
import { configWith } from '../support/data.js';
import { memorySource, sourcesOf } from '../support/memory.js';

const folder = process.env.RETURNFALL_FLEET;

/** Rows of a plain file as `month of the last column, product`, counted. */
function countByMonth(name: string, product: (cells: string[]) => string): Map<string, number> {
  const counts = new Map<string, number>();
  for (const line of readFileSync(join(folder ?? '', name), 'utf8')
    .trim()
    .split('\n')
    .slice(1)) {
    const cells = line.split(',');
    const key = `${product(cells)} ${cells[2]?.slice(0, 7)}`;
    counts.set(key, (counts.get(key) ?? 0) + 1);
  }
  return counts;
}

function fileSource(name: string): Source {
  const path = join(folder ?? '', name);
  return { ...memorySource(name, readFileSync(path)), open: () => createReadStream(path) };
}

function byMonth(
  products: readonly IntakeProduct[],
  kind: 'shipped' | 'returned' | 'withdrawn',
): Map<string, number> {
  const counts = new Map<string, number>();
  const add = (key: string, units: number) => {
    if (units > 0) counts.set(key, (counts.get(key) ?? 0) + units);
  };
  for (const { product, table } of products) {
    for (const row of table?.rows ?? []) {
      if (kind === 'shipped') add(`${product} ${row.shippedIn}`, row.shipped);
      else for (const [i, units] of row[kind].entries()) add(`${product} ${table?.periods[i]}`, units);
    }
  }
  return counts;
}

const sorted = (counts: Map<string, number>) => [...counts].sort();

test.skipIf(folder === undefined)(
  'the real fleet: units, returns and withdrawals by product and month',
  async () => {
    const config = configWith({ asOf: '2016-03-31' });
    const sources = sourcesOf({
      shipments: [fileSource('shipments.csv')],
      returns: [fileSource('returns.csv')],
      withdrawals: [fileSource('withdrawn.csv')],
    });
    const intake = await ingest(config, sources, () => {});
    const { products } = intakeDocument(config, intake);
    expect(intake.rejects).toEqual([]);
    const total = (of: 'units' | 'returns' | 'withdrawn') =>
      products.reduce((sum, product) => sum + product[of], 0);
    expect([total('units'), total('returns'), total('withdrawn'), products.length]).toEqual([
      50_921, 1516, 436, 53,
    ]);
    const named = (cells: string[]) => cells[1] ?? '';
    expect(sorted(byMonth(products, 'shipped'))).toEqual(sorted(countByMonth('shipments.csv', named)));
    expect(sorted(byMonth(products, 'returned'))).toEqual(sorted(countByMonth('returns.csv', named)));
    expect(sorted(byMonth(products, 'withdrawn'))).toEqual(sorted(countByMonth('withdrawn.csv', named)));
  },
);
