import { createHash } from 'node:crypto';
import { gunzipSync } from 'node:zlib';
import type { Config, InputConfig } from '../../src/config.js';
import { ingest } from '../../src/ingest/ingest.js';
import type { InputRole, Intake, Source, Sources } from '../../src/records.js';
import { configWith } from './data.js';

/** A file in memory, read in pieces of `pieceLength` bytes; decompressed when its name ends in `.gz`. */
export function memorySource(name: string, content: string | Uint8Array, pieceLength = 65536): Source {
  const stored = typeof content === 'string' ? Buffer.from(content) : Buffer.from(content);
  return {
    name,
    open: () => pieces(name.endsWith('.gz') ? gunzipSync(stored) : stored, pieceLength),
    digest: async () => ({
      bytes: stored.length,
      sha256: createHash('sha256').update(stored).digest('hex'),
    }),
  };
}

/** Files by role, as text or as sources; a text becomes a file called after its role. */
export type Given = Partial<Record<InputRole, string | readonly Source[]>>;

export function sourcesOf(given: Given): Sources {
  const of = (role: InputRole): readonly Source[] => {
    const files = given[role] ?? [];
    return typeof files === 'string' ? [memorySource(`${role}.csv`, files)] : files;
  };
  return {
    shipments: of('shipments'),
    returns: of('returns'),
    withdrawals: of('withdrawals'),
    plan: of('plan'),
    table: of('table'),
    'table-withdrawn': of('table-withdrawn'),
    ages: of('ages'),
  };
}

/** Ingest of files in memory as of 2026-10-31; any share of rows may be rejected unless `changes` says otherwise. */
export function ingestText(given: Given, changes: Partial<Config> = {}): Promise<Intake> {
  const config = configWith({ asOf: '2026-10-31', maxRejectShare: 1, ...changes });
  return ingest(config, sourcesOf(given), () => {});
}

/** How files are read, with some settings changed. */
export function inputWith(changes: Partial<InputConfig>): InputConfig {
  return { files: [], columns: {}, dateFormat: null, encoding: null, ...changes };
}

async function* pieces(bytes: Buffer, length: number): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < bytes.length; at += length) yield bytes.subarray(at, at + length);
}
