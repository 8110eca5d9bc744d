import type { Segment } from './records.js';

/** `plant=X; region=Y`, as CSV files and readers name a segment; empty when there is none. */
export function segmentText(segment: Segment | null): string {
  return Object.entries(segment ?? {})
    .map(([column, value]) => `${column}=${value}`)
    .join('; ');
}

/** One text for a product and its segment (as `segmentText` gives it), different for different ones. */
export function productKey(product: string, segment: string): string {
  return JSON.stringify([product, segment]);
}
