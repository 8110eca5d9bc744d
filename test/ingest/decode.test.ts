import { gzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { UserError } from '../../src/errors.js';
import { utf8Bytes } from '../../src/ingest/decode.js';
import { memorySource } from '../support/memory.js';

async function decoded(
  content: Uint8Array | string,
  encoding: string | null,
  pieceLength: number,
  name = 'a.csv',
) {
  const parts: Buffer[] = [];
  for await (const part of utf8Bytes(memorySource(name, content, pieceLength), encoding)) parts.push(part);
  return Buffer.concat(parts).toString('utf8');
}

const text = 'Gerät,größe\n日本,€ 𝄞\n';
const utf16 = (bytes: Buffer) => Buffer.concat([Buffer.from([0xff, 0xfe]), bytes]);

test.each([1, 2, 3, 5, 65536])('reads every encoding alike in pieces of %i bytes', async (length) => {
  const little = Buffer.from(text, 'utf16le');
  const big = Buffer.from(little).swap16();
  expect(await decoded(text, null, length)).toBe(text);
  expect(await decoded(`\ufeff${text}`, null, length)).toBe(text);
  expect(await decoded(utf16(little), null, length)).toBe(text);
  expect(await decoded(Buffer.concat([Buffer.from([0xfe, 0xff]), big]), null, length)).toBe(text);
  expect(await decoded(little, 'utf-16le', length)).toBe(text);
  expect(await decoded(Buffer.from('Gerät,größe\n', 'latin1'), 'latin1', length)).toBe('Gerät,größe\n');
});

test('windows-1252 has the euro sign where ISO 8859-1 has a control (WHATWG Encoding, index windows-1252)', async () => {
  expect(await decoded(Buffer.from([0x80]), 'windows-1252', 10)).toBe('€');
});

test('a compressed file is read as its content', async () => {
  expect(await decoded(gzipSync(text), null, 7, 'a.csv.gz')).toBe(text);
});

test.each([1, 100])('gzip under another name is said to be that, in pieces of %i bytes', async (length) => {
  for (const [name, encoding] of [
    ['-', null],
    ['a.csv', 'windows-1252'],
  ] as const) {
    await expect(decoded(gzipSync(text), encoding, length, name)).rejects.toMatchObject({
      exitCode: 3,
      faults: [
        { code: 'compressed-file', file: name, remedy: expect.stringMatching(/^name it \.gz, or unpack/) },
      ],
    });
  }
});

test('a byte-order mark of UTF-8 decides against the setting', async () => {
  expect(await decoded(`\ufeff${text}`, 'windows-1252', 5)).toBe(text);
});

test.each([
  ['a lone continuation byte', [0x61, 0x80, 0x61], 1],
  ['a character cut by the end of the file', [0x61, 0xe2, 0x82], 1],
  ['a character cut by another', [0x61, 0x62, 0xe2, 0x61], 2],
  ['a surrogate (RFC 3629, section 3)', [0x61, 0xed, 0xa0, 0x80], 1],
  ['an overlong form (RFC 3629, section 3)', [0xc0, 0xaf], 0],
  ['a real replacement character before it', [0xef, 0xbf, 0xbd, 0x61, 0xff], 4],
])('invalid UTF-8 is refused with its offset: %s', async (_, bytes, offset) => {
  for (const length of [1, 2, 3, 100]) {
    for (const before of [0, 1000]) {
      const content = Buffer.concat([Buffer.alloc(before, 'x'), Buffer.from(bytes)]);
      for (const encoding of [null, 'utf-8', 'UTF8']) {
        const error = await decoded(content, encoding, length).catch((e: unknown) => e);
        expect(error).toBeInstanceOf(UserError);
        expect(error).toMatchObject({ exitCode: 3, faults: [{ code: 'invalid-utf8', file: 'a.csv' }] });
        expect((error as UserError).message).toContain(`byte offset ${before + offset};`);
      }
    }
  }
});

test('the offset counts a byte-order mark', async () => {
  await expect(decoded(Buffer.from([0xef, 0xbb, 0xbf, 0x61, 0xff]), null, 100)).rejects.toThrow(
    'byte offset 4;',
  );
});

test('an unknown encoding is a fault of the settings', async () => {
  await expect(decoded('a', 'klingon', 10)).rejects.toMatchObject({
    exitCode: 2,
    faults: [{ code: 'unknown-encoding' }],
  });
});

test('half a character of UTF-16 is a fault of the file', async () => {
  const half = Buffer.from([0xff, 0xfe, 0x61, 0x00, 0x61]);
  await expect(decoded(half, null, 10)).rejects.toMatchObject({
    exitCode: 3,
    faults: [{ code: 'invalid-encoding' }],
  });
});
