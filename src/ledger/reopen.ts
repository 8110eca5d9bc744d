import type { FileAccount, IntakeDocument, MonthEnd, RejectRow, RunDocument } from '../records.js';
import { productKey, segmentText } from '../segment.js';
import { alteredFile, missingFile } from './altered.js';
import { fitSchema } from './fit-schema.js';
import { forecastSchema } from './forecast-schema.js';
import { intakeSchema } from './intake-schema.js';
import { readLeftCsv } from './read-csv.js';
import { readDocument } from './read-json.js';
import { readRecords } from './read-records.js';
import { rejectColumns } from './rejects.js';
import { digestOf } from './run.js';
import { runSchema } from './run-schema.js';

/** The files that `reopen` reads where they are there, by name within the folder. */
export const reopenedFiles = [
  'run.json',
  'intake.json',
  'cells.csv',
  'rejects.csv',
  'fit.json',
  'forecast.json',
] as const;

/**
 * What an earlier run left, as it knew it; stages that are not there are null.
 * @param files texts by name, `reopenedFiles`; with run.json among them the others must be byte for byte what it lists.
 * @throws UserError exit 3 when a file is missing, altered or of another schema.
 */
export function reopen(files: ReadonlyMap<string, string>): MonthEnd {
  checkHashes(files);
  const table = readDocument(
    'intake.json',
    textOf(files, 'intake.json'),
    'returnfall/intake/1',
    intakeSchema,
  );
  const rejects = readRejects(textOf(files, 'rejects.csv'), table.files);
  const products = readRecords(textOf(files, 'cells.csv'), table);
  const [fitText, forecastText] = [files.get('fit.json'), files.get('forecast.json')];
  const fit = fitText === undefined ? null : readDocument('fit.json', fitText, 'returnfall/fit/1', fitSchema);
  const forecast =
    forecastText === undefined
      ? null
      : readDocument('forecast.json', forecastText, 'returnfall/forecast/1', forecastSchema);
  if (fit !== null) checkProducts('fit.json', fit, table);
  if (forecast !== null) checkProducts('forecast.json', forecast, table);
  return {
    intake: { products, files: table.files, rejects, findings: table.findings },
    table,
    fit,
    forecast,
  };
}

/**
 * The run.json of an earlier run.
 * @throws UserError exit 3 when it is missing, altered or of another schema.
 */
export function reopenRun(files: ReadonlyMap<string, string>): RunDocument {
  return readDocument('run.json', textOf(files, 'run.json'), 'returnfall/run/1', runSchema);
}

function textOf(files: ReadonlyMap<string, string>, name: string): string {
  const text = files.get(name);
  if (text === undefined) throw missingFile(name);
  return text;
}

function checkHashes(files: ReadonlyMap<string, string>): void {
  if (!files.has('run.json')) return;
  for (const { file, sha256 } of reopenRun(files).outputs) {
    if (!reopenedFiles.some((name) => name === file)) continue;
    if (digestOf(textOf(files, file)).sha256 === sha256) continue;
    throw alteredFile(file, `invalid ${file}, it was altered after the run that run.json describes`);
  }
}

function readRejects(text: string, files: readonly FileAccount[]): readonly RejectRow[] {
  const file = 'rejects.csv';
  const rows = readLeftCsv(file, text, rejectColumns);
  const counted = files.reduce((sum, { rejected, setAside }) => sum + rejected + setAside, 0);
  if (rows.length !== counted) {
    throw alteredFile(file, `invalid number of rows, ${rows.length} here and ${counted} in intake.json`);
  }
  return rows.map(({ cells, line }) => {
    const known = /^\d+$/.test(cells.line) && ['rejected', 'set-aside'].includes(cells.kind);
    if (!known) throw alteredFile(file, `invalid row, line ${cells.line} of kind ${cells.kind}`, line);
    return { ...cells, line: Number(cells.line) } as RejectRow;
  });
}

/** A later document must speak of the same day and of the same products, in the same order. */
function checkProducts(
  file: string,
  document: Pick<IntakeDocument, 'asOf'> & { readonly products: readonly ProductName[] },
  table: IntakeDocument,
): void {
  const names = (products: readonly ProductName[]) =>
    products.map(({ product, segment }) => productKey(product, segmentText(segment))).join();
  if (document.asOf === table.asOf && names(document.products) === names(table.products)) return;
  throw alteredFile(file, `invalid ${file}, its products or its as-of date are not those of intake.json`);
}

type ProductName = Pick<IntakeDocument['products'][number], 'product' | 'segment'>;
