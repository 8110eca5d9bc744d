import { join } from 'node:path';
import type { MonthEnd, RunDocument } from '../records.js';
import type { Invocation } from './arguments.js';
import { fitText } from './print/fit.js';
import { forecastText } from './print/forecast.js';
import { headlineText } from './print/headline.js';
import { tableText } from './print/table.js';
import { numberText, printable } from './print/text.js';

/** What `--json` prints: the document that the command is about. */
export function mainDocument({ command }: Invocation, result: MonthEnd, run: RunDocument | null): unknown {
  if (command === 'report') return run;
  if (command === 'table') return result.table;
  return command === 'fit' ? result.fit : (result.forecast ?? result.fit);
}

/** What is printed without `--json`. @param out the folder written, null for none. @param width characters a line. */
export function resultText(
  { command }: Invocation,
  out: string | null,
  result: MonthEnd,
  width: number,
): string {
  const { table, fit, forecast } = result;
  if (command === 'table') return tableText(table, width);
  if (command === 'fit' && fit !== null) return fitText(fit);
  if (command === 'forecast' && forecast !== null) return forecastText(forecast);
  const page = `${join(out ?? '', 'index.html')}\n`;
  if (forecast !== null) return `${page}\n${headlineText(forecast)}`;
  return fit === null ? page : `${page}\n${fitText(fit)}`;
}

/** The closing line: what was read, what was left out, where it is. */
export function summaryText(
  { command }: Invocation,
  out: string | null,
  result: MonthEnd,
  missing: number,
): string {
  const { files, products } = result.table;
  const units = total(products.map((product) => product.units));
  const returns = total(products.map((product) => product.returns));
  const rejected = total(files.map((file) => file.rejected));
  const setAside = total(files.map((file) => file.setAside));
  const parts = [
    `${counted(products.length, 'product')}${missing === 0 ? '' : ` (${missing} not forecast)`}`,
    counted(units, 'unit'),
    counted(returns, 'return'),
    `${counted(rejected, 'row')} rejected`,
    `${numberText(setAside)} set aside`,
  ];
  const place = out === null ? '' : `; written to ${printable(out)}`;
  return `returnfall ${command}: ${parts.join(', ')}${place}\n`;
}

function counted(count: number, what: string): string {
  return `${numberText(count)} ${what}${count === 1 ? '' : 's'}`;
}

function total(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0);
}
