/** Fitted curves against the nonparametric estimate, ready to draw. */
import { max } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import { daysPerMonth } from '../calendar.js';
import type { Curve, FitProduct, NonparametricPoint } from '../records.js';
import { frame, roomFor, svgNumber, type Tick } from './axis.js';
import { candidateName, isChosen } from './candidates.js';
import { curveTable, pointRows } from './curves-table.js';
import { measureText, percentText, tickText } from './numbers.js';
import { plural } from './period-words.js';

/** View of charts/curves.hbs; null when there is neither a point nor a curve. @param ageUnit null: days, shown in months. */
export function curvesChart(id: string, fit: FitProduct, ageUnit: string | null) {
  if (fit.curves.length === 0 && fit.nonparametric.length === 0) return null;
  const place = placing(fit, ageUnit === null ? daysPerMonth : 1);
  const unit = ageUnit ?? 'month';
  const chosen = fit.curves.filter((curve) => isChosen(fit, curve));
  const others = fit.curves.filter((curve) => !isChosen(fit, curve));
  const yTicks = shareTicks(place);
  return {
    id,
    title: 'Share returned by age, fitted and observed',
    description: describe(fit, place, plural(unit)),
    frame,
    xTicks: ageTicks(place),
    yTicks,
    room: roomFor(yTicks),
    others: others.map((curve) => ({ name: candidateName(curve), path: curvePath(curve, place) })),
    chosen: chosen.map((curve) => ({ name: candidateName(curve), path: curvePath(curve, place) })),
    points: fit.nonparametric.map((point) => pointMark(point, place, unit)),
    units: plural(unit),
    level: percentText(fit.nonparametricLevel),
    warranty: warrantyMark(fit, place),
    radius: fit.nonparametric.length > 60 ? 1.75 : 3,
    pointRows: pointRows(fit, place.unitLength),
    curveTable: curveTable(fit, place.unitLength, place.x.domain()[1] ?? Infinity),
    legend: legend(fit, chosen, others),
  };
}

interface Placing {
  /** Age in percent of the width. */
  readonly x: ReturnType<typeof scaleLinear<number, number>>;
  readonly y: ReturnType<typeof scaleLinear<number, number>>;
  /** Days in the unit that ages are shown in. */
  readonly unitLength: number;
}

/**
 * The upper bound of a thin last point may be far above; the axis then ends at half above the highest estimate. Across,
 * it ends with the warranty, beyond which no curve is used, unless points lie later.
 */
function placing(fit: FitProduct, unitLength: number): Placing {
  const lastPoint = max(fit.nonparametric, (p) => p.age) ?? 0;
  const oldest = Math.max(lastPoint, max(fit.curves.flatMap((c) => c.ages)) ?? 0);
  const end = Math.max(lastPoint, Math.min(oldest, warrantyDays(fit)));
  const chosen = fit.curves.filter((curve) => isChosen(fit, curve)).flatMap((curve) => curve.probability);
  const high = max([...fit.nonparametric.map((p) => p.probability), ...chosen]) ?? 0;
  const top = Math.min(1, 1.5 * high, Math.max(high, max(fit.nonparametric, (p) => p.upper) ?? 0));
  return {
    x: scaleLinear([0, (end > 0 ? end : 1) / unitLength], [0, 100]),
    y: scaleLinear([0, top > 0 ? top : 0.01], [frame.bottom, frame.top]).nice(5),
    unitLength,
  };
}

function ageTicks({ x }: Placing): readonly Tick[] {
  const wide = x.ticks(8);
  const narrow = new Set(x.ticks(4));
  return wide.map((age) => ({ at: svgNumber(x(age)), label: tickText(age), wideOnly: !narrow.has(age) }));
}

function shareTicks({ y }: Placing): readonly Tick[] {
  return y.ticks(5).map((share) => ({ at: svgNumber(y(share)), label: percentText(share), wideOnly: false }));
}

function curvePath(curve: Curve, { x, y, unitLength }: Placing): string | null {
  return line<number>()
    .x((_, i) => (x((curve.ages[i] ?? 0) / unitLength) / 100) * frame.pathWidth)
    .y((probability) => y(probability))
    .digits(2)(curve.probability);
}

function pointMark(point: NonparametricPoint, { x, y, unitLength }: Placing, unit: string) {
  const age = point.age / unitLength;
  return {
    x: svgNumber(x(age)),
    y: svgNumber(y(point.probability)),
    lower: svgNumber(y(point.lower)),
    upper: svgNumber(Math.max(y(point.upper), frame.clipTop)),
    label: `${measureText(age)} ${age === 1 ? unit : plural(unit)}: ${percentText(point.probability)} returned`,
  };
}

/** Where warranty ends, when the axis reaches so far. */
function warrantyMark(fit: FitProduct, { x, unitLength }: Placing) {
  const at = svgNumber(x(warrantyDays(fit) / unitLength));
  if (!(at <= 100)) return null;
  return { at, anchor: at < 50 ? 'start' : 'end', offset: at < 50 ? 6 : -6 };
}

/** The age at which warranty ends, Infinity without a limit; months are drawn at their mean length. */
function warrantyDays(fit: FitProduct): number {
  return Math.min(fit.warrantyDays ?? Infinity, (fit.warrantyMonths ?? Infinity) * daysPerMonth);
}

function legend(fit: FitProduct, chosen: readonly Curve[], others: readonly Curve[]) {
  const entry = (kind: string, label: string, shown: boolean) => (shown ? [{ kind, label }] : []);
  return [
    ...entry(
      'point',
      `nonparametric estimate with its ${percentText(fit.nonparametricLevel)} interval`,
      fit.nonparametric.length > 0,
    ),
    ...chosen.flatMap((curve) => entry('chosen', `${candidateName(curve)}, chosen`, true)),
    ...entry('other', `not chosen: ${others.map(candidateName).join(', ')}`, others.length > 0),
  ];
}

function describe(fit: FitProduct, { unitLength }: Placing, units: string): string {
  const last = fit.nonparametric.at(-1);
  const chosen = fit.candidates.find((candidate) => isChosen(fit, candidate));
  const fitted =
    chosen === undefined ? '' : ` The strong line is the chosen distribution, ${candidateName(chosen)}.`;
  if (last === undefined) return `Lines show the share of units returned by age in ${units}.${fitted}`;
  const age = `${measureText(last.age / unitLength)} ${units}`;
  const range = `${percentText(last.lower)} to ${percentText(last.upper)}`;
  const share = `${percentText(last.probability)}, ${percentText(fit.nonparametricLevel)} interval ${range}`;
  return `Points show the share of units returned by age: by ${age} of age ${share}.${fitted}`;
}
