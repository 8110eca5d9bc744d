import type { Segment } from '../../records.js';
import { segmentText } from '../../segment.js';
import { printable } from './text.js';

/** A product as a terminal shows it: `HV-200` or `HV-200 (plant=X)`. */
export function nameOf(named: { readonly product: string; readonly segment: Segment | null }): string {
  const segment = segmentText(named.segment);
  return printable(segment === '' ? named.product : `${named.product} (${segment})`);
}

/** A candidate as a terminal shows it: `weibull` or `weibull, share at risk`. */
export function candidateName(candidate: {
  readonly family: string;
  readonly atRisk: number | null;
}): string {
  return candidate.atRisk === null ? candidate.family : `${candidate.family}, share at risk`;
}
