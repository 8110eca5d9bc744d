import type { MonthEnd } from '../records.js';
import { cellsCsv } from './cells.js';
import { forecastCsv } from './forecast.js';
import { jsonText } from './json.js';
import { rejectsCsv } from './rejects.js';
import { tableCsv, tableWithdrawnCsv } from './tables.js';

/**
 * The data files of the stages that are there, by name: table.csv, table-withdrawn.csv where units were withdrawn,
 * cells.csv, rejects.csv, intake.json; fit.json; forecast.json and forecast.csv.
 */
export function outputFiles({ intake, table, fit, forecast }: MonthEnd): ReadonlyMap<string, string> {
  const withdrawn = tableWithdrawnCsv(table);
  return new Map([
    ['table.csv', tableCsv(table)],
    ...(withdrawn === null ? [] : [['table-withdrawn.csv', withdrawn] as const]),
    ['cells.csv', cellsCsv(intake.products)],
    ['rejects.csv', rejectsCsv(intake.rejects)],
    ['intake.json', jsonText(table)],
    ...(fit === null ? [] : [['fit.json', jsonText(fit)] as const]),
    ...(forecast === null
      ? []
      : ([
          ['forecast.json', jsonText(forecast)],
          ['forecast.csv', forecastCsv(forecast)],
        ] as const)),
  ]);
}
