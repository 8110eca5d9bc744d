import type { Finding, ProductRecords } from '../records.js';
import type { FileTally } from './tally.js';

/** Products, and the running accounts of the files that they came from. */
export interface Reading {
  readonly products: readonly ProductRecords[];
  readonly tallies: readonly FileTally[];
  /** What a reader should know beside the accounts. */
  readonly findings: readonly Finding[];
}
