/** Names of products and of their pages. */
import { createHash } from 'node:crypto';
import type { Segment } from '../records.js';
import { segmentText } from '../segment.js';

/** `HV-200`, or `HV-200, plant=X; region=Y` for a part of a product. */
export function productName(product: string, segment: Segment | null): string {
  return segment === null ? product : `${product}, ${segmentText(segment)}`;
}

/**
 * The file name of a product's page, without extension: lower-case ASCII letters, digits and `-`, at most 60, then `-`
 * and the first 8 hex digits of the SHA-256 of the product (with a segment: product, line feed, segment as in CSV).
 */
export function slugOf(product: string, segment: Segment | null): string {
  const identity = segment === null ? product : `${product}\n${segmentText(segment)}`;
  const letters = identity.replace(/[A-Z]/g, (letter) => letter.toLowerCase()).replace(/[^a-z0-9]+/g, '-');
  const base = letters.replace(/^-/, '').slice(0, 60).replace(/-$/, '');
  const digest = createHash('sha256').update(identity, 'utf8').digest('hex');
  return `${base === '' ? 'product' : base}-${digest.slice(0, 8)}`;
}
