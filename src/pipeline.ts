import type { Config } from './config.js';
import { drawsForForecast } from './fit/drawn.js';
import { fitProduct } from './fit/product.js';
import { forecastProduct, type ProductDraws } from './forecast/product.js';
import { totalForecast } from './forecast/total.js';
import { intakeDocument } from './ingest/document.js';
import { ingest } from './ingest/ingest.js';
import type {
  FitDocument,
  FitProduct,
  ForecastDocument,
  MonthEnd,
  ProductRecords,
  Progress,
  Source,
  Sources,
} from './records.js';

/** How a run touches the world. The real ones are in cli/; tests pass recording ones. */
export interface Effects {
  /**
   * The files that paths or patterns name, patterns expanded and sorted by code point, each file once.
   * @throws UserError exit 3 when a file is missing or a pattern matches nothing.
   */
  readonly sources: (patterns: readonly string[]) => Promise<readonly Source[]>;
  /**
   * Results of a task in the order of its inputs, computed in this process or in workers.
   * @param seconds a guess of the whole work on one core, in seconds; below half a second no worker is worth its start.
   */
  readonly parallel: <T extends TaskName>(
    task: T,
    inputs: readonly Parameters<Tasks[T]>[0][],
    seconds: number,
    onDone: (finished: number) => void,
  ) => Promise<readonly ReturnType<Tasks[T]>[]>;
  readonly progress: Progress;
}

/** The pure functions that workers may be asked for, by name. */
export const tasks = {
  fit: (input: { readonly config: Config; readonly records: ProductRecords }): FitProduct =>
    fitProduct(input.config, input.records),
  forecast: (input: {
    readonly config: Config;
    readonly records: ProductRecords;
    readonly fit: FitProduct;
  }): ProductDraws => {
    const draws = drawsForForecast(input.config, input.records, input.fit);
    return forecastProduct(input.config, input.records, input.fit, draws);
  },
};
export type Tasks = typeof tasks;
export type TaskName = keyof Tasks;

/** The stages in order; a command goes on until one of them. */
export type Until = 'table' | 'fit' | 'forecast';

/**
 * The month end: records to table, fit and forecast.
 * @param earlier what a previous command left: `intake` alone, or `intake` and `fit`.
 * @throws UserError exit 3 when the records cannot be used, exit 2 when the settings do not fit them (no as-of date, no
 * returns, another period).
 */
export async function monthEnd(
  config: Config,
  until: Until,
  effects: Effects,
  earlier: Partial<Pick<MonthEnd, 'intake' | 'fit'>> = {},
): Promise<MonthEnd> {
  const intake =
    earlier.intake ?? (await ingest(config, await openInputs(config, effects), effects.progress));
  const table = intakeDocument(config, intake);
  if (until === 'table') return { intake, table, fit: null, forecast: null };
  const fit = earlier.fit ?? (await fitAll(config, intake.products, effects));
  if (until === 'fit') return { intake, table, fit, forecast: null };
  const forecast = await forecastAll(config, intake.products, fit, effects);
  return { intake, table, fit, forecast };
}

async function openInputs(config: Config, effects: Effects): Promise<Sources> {
  return {
    shipments: await effects.sources(config.shipments.files),
    returns: await effects.sources(config.returns.files),
    withdrawals: await effects.sources(config.withdrawals.files),
    plan: await effects.sources(config.plan.files),
    table: await effects.sources(config.table.files),
    'table-withdrawn': await effects.sources(config.tableWithdrawn.files),
    ages: await effects.sources(config.ages.files),
  };
}

async function fitAll(
  config: Config,
  products: readonly ProductRecords[],
  effects: Effects,
): Promise<FitDocument> {
  const inputs = products.map((records) => ({ config, records }));
  const done = (n: number) => effects.progress('fitting products', n, products.length);
  const seconds = 0.3 * products.filter(({ returned, ages }) => returned.length + ages.length > 0).length;
  const fits = await effects.parallel('fit', inputs, seconds, done);
  return { schema: 'returnfall/fit/1', asOf: config.asOf, ageUnit: config.ageUnit, products: fits };
}

async function forecastAll(
  config: Config,
  products: readonly ProductRecords[],
  fit: FitDocument,
  effects: Effects,
): Promise<ForecastDocument> {
  const inputs = products.map((records, i) => ({ config, records, fit: fit.products[i] as FitProduct }));
  const done = (n: number) => effects.progress('forecasting products', n, products.length);
  const seconds = (config.draws / 4000) * fit.products.filter(({ chosen }) => chosen !== null).length;
  const results = await effects.parallel('forecast', inputs, seconds, done);
  return {
    schema: 'returnfall/forecast/1',
    asOf: config.asOf,
    period: config.period,
    horizon: config.horizon,
    levels: config.levels,
    products: results.map((r) => r.product),
    total: totalForecast(config, results),
  };
}
