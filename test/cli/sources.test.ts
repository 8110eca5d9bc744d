import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { Readable } from 'node:stream';
import { gzipSync } from 'node:zlib';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openScope } from '../../src/cli/scope.js';
import { fileSources } from '../../src/cli/sources.js';
import type { Source } from '../../src/records.js';

let base = '';
beforeEach(() => {
  base = mkdtempSync(join(tmpdir(), 'sources-'));
});
afterEach(() => rmSync(base, { recursive: true, force: true }));

function put(name: string, content: string | Uint8Array): void {
  mkdirSync(dirname(join(base, name)), { recursive: true });
  writeFileSync(join(base, name), content);
}

function open(options: { stdin?: string; replaced?: string; folder?: string } = {}) {
  const scope = openScope();
  const sources = fileSources({
    base: join(base, options.folder ?? ''),
    stdin: Readable.from([options.stdin ?? '']),
    scope,
    replaced: options.replaced === undefined ? null : join(base, options.replaced),
  });
  return { scope, sources };
}

async function textOf(source: Source | undefined): Promise<string> {
  const chunks: Uint8Array[] = [];
  for await (const chunk of source?.open() ?? []) chunks.push(chunk);
  return Buffer.concat(chunks).toString('utf8');
}

describe('fileSources', () => {
  it('names files relative to the base and lists each once, sorted by code point', async () => {
    for (const name of ['b.csv', 'A.csv', 'é.csv', 'other/c.csv']) put(name, name);
    const { sources } = open({ folder: 'other' });
    const found = await sources(['../b.csv', '../*.csv', 'c.csv']);
    expect(found.map((source) => source.name)).toEqual(['../A.csv', '../b.csv', '../é.csv', 'c.csv']);
    expect(await textOf(found[1])).toBe('b.csv');
  });

  it('unzips by name, also when the parts were joined, and digests the file as it lies on disk', async () => {
    const zipped = Buffer.concat([gzipSync('one\n'), gzipSync('two\n')]);
    put('a.csv.gz', zipped);
    const [source] = await open().sources(['a.csv.gz']);
    expect(await textOf(source)).toBe('one\ntwo\n');
    const sha256 = createHash('sha256').update(zipped).digest('hex');
    expect(await source?.digest()).toEqual({ bytes: zipped.length, sha256 });
  });

  it('says that a damaged or shortened gzip file cannot be read', async () => {
    const zipped = gzipSync('a long enough text to be cut in the middle'.repeat(20));
    put('cut.csv.gz', zipped.subarray(0, 40));
    put('plain.csv.gz', 'not zipped at all');
    for (const name of ['cut.csv.gz', 'plain.csv.gz']) {
      const [source] = await open().sources([name]);
      const fault = await textOf(source).catch((error: unknown) => error);
      expect(fault).toMatchObject({ exitCode: 3, faults: [{ code: 'unreadable-file', file: name }] });
    }
  });

  it('reads standard input once, any number of times, and removes the copy', async () => {
    const { sources, scope } = open({ stdin: 'product\nA\n' });
    const before = await sources(['-']);
    const [source] = before;
    expect([await textOf(source), await textOf(source)]).toEqual(['product\nA\n', 'product\nA\n']);
    await expect(sources(['-'])).rejects.toMatchObject({ exitCode: 2, faults: [{ code: 'stdin-twice' }] });
    scope.close();
    await expect(textOf(source)).rejects.toMatchObject({ exitCode: 3 });
  });

  it('tells a missing file, an idle pattern and a folder apart', async () => {
    put('folder/a.csv', '');
    const { sources } = open();
    await expect(sources(['nothing.csv'])).rejects.toThrow(
      /^nothing.csv: missing file; paths are relative to /,
    );
    await expect(sources(['*.tsv'])).rejects.toThrow(/^\*.tsv: missing files: the pattern matches none/);
    await expect(sources(['folder'])).rejects.toThrow(
      /it is a folder; name its files, such as folder\/\*\.csv/,
    );
    await expect(sources(['nothing.csv'])).rejects.toMatchObject({ exitCode: 3 });
  });

  it('refuses an input inside the folder that is about to be replaced', async () => {
    put('out/table.csv', '');
    put('out-2/table.csv', '');
    const { sources } = open({ replaced: 'out' });
    await expect(sources(['out/table.csv'])).rejects.toMatchObject({ exitCode: 2 });
    expect(await sources(['out-2/table.csv'])).toHaveLength(1);
    expect(existsSync(join(base, 'out/table.csv'))).toBe(true);
  });
});
