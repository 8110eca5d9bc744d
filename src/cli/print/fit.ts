import type { CandidateFit, FitDocument, FitProduct } from '../../records.js';
import { candidateName, nameOf } from './names.js';
import { type Align, alignColumns, measureText, numberText, plainNumber, printable } from './text.js';

const aligns: readonly Align[] = ['left', 'left', 'right', 'right', 'right', 'right', 'right', 'right'];
const head = ['', 'parameter', 'estimate', 'from', 'to', 'log L', 'AICc', 'weight'];

/** The candidates of every product, best first, with their parameters and what speaks against them. */
export function fitText(document: FitDocument): string {
  return document.products.map((product) => `${productLines(product, document).join('\n')}\n`).join('\n');
}

function productLines(product: FitProduct, document: FitDocument): string[] {
  const chosen = product.candidates.find((c) => c.family === product.chosen && c.ruledOut === null);
  const candidates = product.candidates.flatMap((c) => candidateRows(c, c === chosen));
  return [
    title(product, document.ageUnit),
    ...(candidates.length === 0 ? [] : alignColumns([head, ...candidates], aligns)),
    ...(candidates.length === 0 ? [] : [intervalNote(product.candidates, document.ageUnit)]),
    ...product.candidates.flatMap(ruledOutLine),
    ...product.findings.map(({ severity, message }) => `${severity}: ${printable(message)}`),
    ...(product.notForecast === null ? [] : [`not forecast: ${printable(product.notForecast.message)}`]),
  ];
}

function title(product: FitProduct, unit: string): string {
  const { units, returns, withdrawn, survivors, oldestAge, delayDays } = product;
  const counts = [
    `${numberText(units)} units`,
    `${numberText(returns)} returns`,
    `${numberText(withdrawn)} withdrawn`,
    `${numberText(survivors)} survivors`,
    `oldest age ${plainNumber(oldestAge)} ${unitText(unit)}`,
    ...(delayDays > 0 ? [`delay ${plainNumber(delayDays)} days`] : []),
  ];
  return `${nameOf(product)}: ${counts.join(', ')}`;
}

/** One row a parameter; what belongs to the candidate as a whole stands in its first row. */
function candidateRows(candidate: CandidateFit, chosen: boolean): string[][] {
  const shares = candidate.atRisk === null ? [] : [['share at risk', candidate.atRisk] as const];
  const values = [...Object.entries(candidate.parameters), ...shares];
  return values.map(([name, value], at) => {
    const interval = candidate.intervals[name === 'share at risk' ? 'atRisk' : name];
    const first = at === 0;
    return [
      first ? `${chosen ? '*' : ' '} ${candidateName(candidate)}` : '',
      name,
      measureText(value),
      boundText(interval?.lower),
      boundText(interval?.upper),
      first ? numberOrDash(candidate.logLikelihood) : '',
      first ? numberOrDash(candidate.aicc) : '',
      first ? (candidate.ruledOut === null ? candidate.weight.toFixed(3) : 'out') : '',
    ];
  });
}

function intervalNote(candidates: readonly CandidateFit[], unit: string): string {
  const level = candidates.flatMap((c) => Object.values(c.intervals))[0]?.level;
  const intervals =
    level === undefined ? '' : `; from, to: ${plainNumber(100 * level)} % likelihood-ratio interval`;
  return `* chosen; ages in ${unitText(unit)}${intervals}`;
}

function ruledOutLine(candidate: CandidateFit): string[] {
  if (candidate.ruledOut === null) return [];
  return [`ruled out: ${candidateName(candidate)}: ${printable(candidate.ruledOut.message)}`];
}

function boundText(bound: number | null | undefined): string {
  return bound === undefined || bound === null ? '-' : measureText(bound);
}

function numberOrDash(value: number | null): string {
  return value === null ? '-' : numberText(value, 2);
}

function unitText(unit: string): string {
  return unit === 'day' ? 'days' : printable(unit);
}
