import fc from 'fast-check';
import { expect, test } from 'vitest';
import { UserError } from '../../src/errors.js';
import { intakeDocument } from '../../src/ingest/document.js';
import type { InputRole, Intake, Source } from '../../src/records.js';
import { configWith, plainRules } from '../support/data.js';
import { ingestText, memorySource } from '../support/memory.js';

const roles = ['shipments', 'returns', 'withdrawals', 'plan'] as const;
type Rows = Readonly<Record<(typeof roles)[number], readonly string[]>>;

const headers: Record<(typeof roles)[number], string> = {
  shipments: 'unit,product,ship_date,quantity,note',
  returns: 'unit,product,ship_date,return_date,quantity,note',
  withdrawals: 'unit,product,ship_date,date,quantity,note',
  plan: 'product,ship_period,quantity,note',
};

const product = fc.constantFrom('A', 'B', 'C');
const unit = fc.constantFrom('u1', 'u2', 'u3', 'u4', 'u5');
const shipped = fc.constantFrom('2026-01-05', '2026-01-06', '2026-01', '2026-02-03', '2026-11-05', 'x');
const left = fc.constantFrom(
  '2026-01-04',
  '2026-01-20',
  '2026-02-01',
  '2026-02',
  '2026-03-15',
  '2026-05-02',
  '2026-12-01',
);
const quantity = fc.constantFrom('1', '2', '5', '-1', '-2', '0');
const note = fc.constantFrom('', 'p', 'q');

const row = (...parts: fc.Arbitrary<string>[]) => fc.tuple(...parts).map((cells) => cells.join(','));
const nothing = fc.constant('');
const leaving = fc.oneof(
  row(unit, fc.constantFrom('', 'A'), nothing, left, nothing, note),
  row(nothing, product, shipped, left, quantity, note),
);
const records: fc.Arbitrary<Rows> = fc.record({
  shipments: fc.array(
    fc.oneof(row(unit, product, shipped, nothing, note), row(nothing, product, shipped, quantity, note)),
    { minLength: 3, maxLength: 14 },
  ),
  returns: fc.array(leaving, { minLength: 1, maxLength: 14 }),
  withdrawals: fc.array(leaving, { maxLength: 6 }),
  plan: fc.array(row(product, fc.constantFrom('2026-11', '2026-12', '2026-10'), quantity, note), {
    maxLength: 4,
  }),
});

/** The rows in another order and cut into files at `cut` (a share of the rows). */
function files(
  rows: Rows,
  order: (list: readonly string[]) => string[],
  cut: number,
): Record<string, Source[]> {
  const split = (role: (typeof roles)[number]) => {
    const list = order(rows[role]);
    const at = Math.round(cut * list.length);
    return [list.slice(0, at), list.slice(at)].map((part, i) =>
      memorySource(`${role}${i}.csv`, `${[headers[role], ...part].join('\n')}\n`),
    );
  };
  return Object.fromEntries(roles.map((role) => [role, split(role)]));
}

const everyProduct = { ...plainRules, warrantyMonths: 2, delayDays: 25, delayReason: 'transport' };

/** The intake, or the fault that a reader is told of; anything else that is thrown fails the test. */
async function intakeOf(given: Record<string, Source[]>): Promise<Intake | UserError> {
  return ingestText(given, { everyProduct }).catch((error: unknown) => {
    if (error instanceof UserError) return error;
    throw error;
  });
}

function outcome(intake: Intake | UserError) {
  return intake instanceof UserError ? intake.message.replace(/\d\.csv(:\d+)?/g, '') : told(intake);
}

/** All that must not depend on the order: the tables, the counts and the rows that are not used. */
function told(intake: Intake) {
  const document = intakeDocument(configWith({ asOf: '2026-10-31' }), intake);
  const refused = intake.rejects.map(
    ({ file, kind, code, column, message, row: text }) =>
      `${file.replace(/\d\.csv$/, '')} ${kind} ${code} ${column} ${message} ${text}`,
  );
  const counts = new Map<InputRole, number[]>();
  for (const { role, read, used, rejected, setAside } of intake.files) {
    const sum = counts.get(role) ?? [0, 0, 0, 0];
    counts.set(
      role,
      [read, used, rejected, setAside].map((n, i) => n + (sum[i] ?? 0)),
    );
  }
  return { products: intake.products, tables: document.products, refused: refused.sort(), counts };
}

test('neither the order of rows nor their division into files changes anything but line numbers', async () => {
  let intakes = 0;
  await fc.assert(
    fc.asyncProperty(
      records,
      fc.infiniteStream(fc.double({ min: 0, max: 1, noNaN: true })),
      fc.double({ min: 0, max: 1, noNaN: true }),
      async (rows, keys, cut) => {
        const shuffled = (list: readonly string[]) =>
          list
            .map((text) => ({ text, key: keys.next().value as number }))
            .sort((a, b) => a.key - b.key)
            .map(({ text }) => text);
        const straight = await intakeOf(files(rows, (list) => [...list], 1));
        if (!(straight instanceof UserError)) intakes++;
        expect(outcome(await intakeOf(files(rows, shuffled, cut)))).toEqual(outcome(straight));
      },
    ),
    { numRuns: 300, seed: 20261031 },
  );
  expect(intakes).toBeGreaterThan(250);
});

test('whatever the rows, the account adds up and no cohort is overdrawn', async () => {
  let intakes = 0;
  await fc.assert(
    fc.asyncProperty(records, async (rows) => {
      const intake = await intakeOf(files(rows, (list) => [...list], 0.5));
      if (intake instanceof UserError) return;
      intakes++;
      for (const file of intake.files) {
        const own = intake.rejects.filter((reject) => reject.file === file.file);
        expect(new Set(own.map(({ line }) => line)).size).toBe(own.length);
        expect(file.used + own.length).toBe(file.read);
        expect(file.used).toBeGreaterThanOrEqual(0);
      }
      for (const { cohorts, returned, withdrawn } of intake.products) {
        cohorts.forEach(({ shipped: units }, index) => {
          const gone = [...returned, ...withdrawn].filter((cell) => cell.cohort === index);
          expect(gone.reduce((sum, cell) => sum + cell.quantity, 0)).toBeLessThanOrEqual(units);
        });
      }
    }),
    { numRuns: 300, seed: 20261031 },
  );
  expect(intakes).toBeGreaterThan(250);
});
