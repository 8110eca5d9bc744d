import { isoDate } from '../calendar.js';
import type { Config } from '../config.js';
import { productCounts } from '../counts.js';
import type { Intake, IntakeDocument, IntakeProduct, ProductRecords } from '../records.js';
import { cutOffOrOpen } from './asof.js';
import { nevadaTable } from './nevada.js';

/** The account and the Nevada-style tables as `intake.json` holds them. */
export function intakeDocument(config: Config, intake: Intake): IntakeDocument {
  return {
    schema: 'returnfall/intake/1',
    title: config.title,
    asOf: config.asOf,
    period: config.period,
    ageUnit: config.ageUnit,
    files: intake.files,
    products: intake.products.map((records) => intakeProduct(config, records)),
    findings: intake.findings,
  };
}

function intakeProduct(config: Config, records: ProductRecords): IntakeProduct {
  const { resolution, ages } = records;
  return {
    ...productCounts(records),
    ...shipDates(records),
    planned: records.planned.map(({ from, to, shipped }) => ({
      from: isoDate(from),
      to: isoDate(to - 1),
      quantity: shipped,
    })),
    rejectedReturns: records.rejectedReturns,
    unusable: records.unusable,
    table: resolution === 'age' ? null : nevadaTable(records, config.period, cutOffOrOpen(config)),
    ages,
  };
}

function shipDates({ cohorts }: ProductRecords): Pick<IntakeProduct, 'firstShipped' | 'lastShipped'> {
  const [first, last] = [cohorts[0], cohorts.at(-1)];
  return {
    firstShipped: first === undefined ? null : isoDate(first.from),
    lastShipped: last === undefined ? null : isoDate(last.to - 1),
  };
}
