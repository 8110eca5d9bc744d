import { expect, test } from 'vitest';
import { plainRules } from '../support/data.js';
import { ingestText } from '../support/memory.js';

const shipments =
  'product,ship_date,quantity\nKettle,2026-01,10\nHV-100,2026-01,10\nHV-200,2026-01,10\nLater,2026-11,10\n';
const returns = 'product,ship_date,return_date\nKettle,2026-01,2026-10\n';

async function warned(...names: string[]): Promise<string[]> {
  const namedProducts = names.map((product) => ({ product, rules: plainRules }));
  const { findings } = await ingestText({ shipments, returns }, { namedProducts });
  return findings
    .filter(({ code }) => code === 'unknown-product-settings')
    .map(({ severity, message }) => `${severity}: ${message}`);
}

test('products of the records are named without a warning', async () => {
  expect(await warned('HV-100', 'Kettle')).toEqual([]);
});

test.each(['Kettel', 'kettle'])('%s may be a slip for Kettle', async (name) => {
  expect(await warned(name)).toEqual([
    `warning: the settings name the product ${name}, which the records do not have by the as-of date 2026-10-31; did you mean Kettle?`,
  ]);
});

test('a product with rules of its own is not what another name was meant for', async () => {
  expect(await warned('HV-100', 'HV-200', 'HV-300', 'Kettel', 'Later')).toEqual([
    'warning: the settings name the product Kettel, which the records do not have by the as-of date 2026-10-31; did you mean Kettle?',
    'warning: the settings name the products HV-300, Later, which the records do not have by the as-of date 2026-10-31',
  ]);
});

test('of many products that are like none, ten are named', async () => {
  const names = Array.from({ length: 12 }, (_, i) => `Toaster ${String.fromCharCode(65 + i)}`);
  expect(await warned(...names)).toEqual([
    `warning: the settings name the products ${names.slice(0, 10).join(', ')} and 2 more, which the records do not have by the as-of date 2026-10-31`,
  ]);
});

test('ages have no as-of date', async () => {
  const config = { asOf: null, namedProducts: [{ product: 'Pmup', rules: plainRules }] };
  const { findings } = await ingestText({ ages: 'product,outcome,age\nPump,returned,5\n' }, config);
  expect(findings.map(({ message }) => message)).toEqual([
    'the settings name the product Pmup, which the records do not have; did you mean Pump?',
  ]);
});
