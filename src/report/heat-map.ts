/** The Nevada-style table as a heat map: numbers in the cells, colour by returns per thousand shipped. */
import { max, quantile } from 'd3-array';
import { scaleLinear, scaleThreshold } from 'd3-scale';
import type { NevadaTable } from '../records.js';
import { coarserTable } from './coarser-table.js';
import { periodParts, shortPeriodText } from './dates.js';
import { countText, noNumber, tickText } from './numbers.js';

/** Shades beyond the empty one. */
const shades = 6;

/** View of partials/heat-map.hbs; null when the table is empty. @param noun what its period is called. */
export function heatMap(full: NevadaTable, noun: string) {
  const { table, grouping } = coarserTable(full);
  if (table.rows.length === 0 || table.periods.length === 0) return null;
  const shadeOf = shading(table);
  const withdrawn = table.rows.some((row) => row.withdrawn.some((units) => units > 0));
  return {
    grouping,
    period: grouping ?? noun,
    withdrawn,
    years: spans(table.periods.map((label) => periodParts(label).year ?? '')),
    columns: table.periods.map((label) => periodParts(label).short),
    narrow: table.periods.length > 24,
    wide: isWide(table),
    rows: table.rows.map((row) => ({
      label: shortPeriodText(row.shippedIn),
      shipped: countText(row.shipped),
      returned: countText(sum(row.returned)),
      withdrawn: countText(sum(row.withdrawn)),
      survivors: countText(row.survivors),
      cells: row.returned.map((units, column) =>
        cell(table, row.shippedIn, row.shipped, units, column, shadeOf),
      ),
    })),
    legend: shadeOf.legend,
  };
}

interface Shading {
  readonly shade: (perThousand: number) => number;
  readonly legend: readonly { readonly shade: number; readonly label: string }[];
}

function cell(
  table: NevadaTable,
  shippedIn: string,
  shipped: number,
  units: number,
  column: number,
  { shade }: Shading,
) {
  if ((table.periods[column] ?? '') < shippedIn) return { text: '', shade: 'before' };
  return { text: units === 0 ? '·' : countText(units), shade: String(shade((units / shipped) * 1000)) };
}

/** Round steps up to the 95th percentile of the cells that hold returns; the darkest shade takes the rest. */
function shading(table: NevadaTable): Shading {
  const rates = table.rows.flatMap((row) => row.returned.map((units) => (units / row.shipped) * 1000));
  const top =
    quantile(
      rates.filter((rate) => rate > 0),
      0.95,
    ) ?? 1;
  const steps = roundSteps(top);
  const scale = scaleThreshold<number, number>()
    .domain(steps)
    .range([...steps.keys(), steps.length].map((i) => i + 1));
  return { shade: (rate) => (rate === 0 ? 0 : scale(rate)), legend: legend(steps) };
}

/** The smallest round step up to `top` that leaves one shade for what lies above. */
function roundSteps(top: number): readonly number[] {
  const scale = scaleLinear([0, top], [0, 1]);
  const choices = Array.from({ length: shades }, (_, i) =>
    scale.ticks(shades - i).filter((step) => step > 0),
  );
  return choices.find((steps) => steps.length < shades) ?? [top];
}

function legend(steps: readonly number[]): Shading['legend'] {
  const labels = steps.map((step, i) => `${tickText(steps[i - 1] ?? 0)} to ${tickText(step)}`);
  const last = steps.at(-1);
  const above = last === undefined ? 'above 0' : `${tickText(last)} and above`;
  return [noNumber, ...labels, above].map((label, shade) => ({ shade, label: shade === 0 ? '0' : label }));
}

/** Whether an upright sheet of paper is too narrow for it. */
function isWide({ periods, rows }: NevadaTable): boolean {
  const digits = String(max(rows.flatMap((row) => row.returned)) ?? 0).length;
  return periods.length * (digits + 1) > 72;
}

/** Runs of equal years with their length. */
function spans(years: readonly string[]) {
  const runs: { year: string; span: number }[] = [];
  for (const year of years) {
    const run = runs.at(-1);
    if (run?.year === year) run.span += 1;
    else runs.push({ year, span: 1 });
  }
  return runs;
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
