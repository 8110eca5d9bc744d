import { describe, expect, test } from 'vitest';
import { readRows } from '../../src/ingest/rows.js';
import { memorySource } from '../support/memory.js';

type Line = [number, ...string[]];

async function rowsOf(
  text: string | Uint8Array,
  pieceLength = 65536,
): Promise<{ header: string[]; rows: Line[]; count: number }> {
  let header: string[] = [];
  const rows: Line[] = [];
  const count = await readRows(memorySource('a.csv', text, pieceLength), null, (cells) => {
    header = cells;
    return (row, line) => rows.push([line, ...row]);
  });
  return { header, rows, count };
}

describe('RFC 4180, section 2', () => {
  test('1: each record on a line of its own, CRLF', async () => {
    expect((await rowsOf('h,i,j\r\naaa,bbb,ccc\r\nzzz,yyy,xxx\r\n')).rows).toEqual([
      [2, 'aaa', 'bbb', 'ccc'],
      [3, 'zzz', 'yyy', 'xxx'],
    ]);
  });
  test('2: the last record may end without a line break', async () => {
    expect((await rowsOf('h,i,j\r\naaa,bbb,ccc\r\nzzz,yyy,xxx')).rows).toHaveLength(2);
  });
  test('3: the first line is the header', async () => {
    expect((await rowsOf('field_name,field_name,field_name\r\naaa,bbb,ccc\r\n')).header).toEqual([
      'field_name',
      'field_name',
      'field_name',
    ]);
  });
  test('4: spaces are part of a field', async () => {
    expect((await rowsOf('h,i,j\r\naaa, bbb ,ccc\r\n')).rows).toEqual([[2, 'aaa', ' bbb ', 'ccc']]);
  });
  test('5: fields may be in quotes', async () => {
    expect((await rowsOf('h,i,j\r\n"aaa","bbb","ccc"\r\nzzz,yyy,xxx')).rows[0]).toEqual([
      2,
      'aaa',
      'bbb',
      'ccc',
    ]);
  });
  test('6: line breaks, quotes and commas inside quotes', async () => {
    const { rows } = await rowsOf('h,i,j\r\n"aaa","b\r\nb,b","ccc"\r\nzzz,yyy,xxx');
    expect(rows).toEqual([
      [2, 'aaa', 'b\r\nb,b', 'ccc'],
      [4, 'zzz', 'yyy', 'xxx'],
    ]);
  });
  test('7: a quote inside quotes is written twice', async () => {
    expect((await rowsOf('h,i,j\r\n"aaa","b""bb","ccc"')).rows).toEqual([[2, 'aaa', 'b"bb', 'ccc']]);
  });
});

test('a quote in the middle of an unquoted field is text', async () => {
  expect((await rowsOf('h,i\n5" pipe,1\n')).rows).toEqual([[2, '5" pipe', '1']]);
});

test.each([1, 2, 3, 7, 64, 65536])(
  'every row has its first physical line, in pieces of %i bytes',
  async (length) => {
    const text = '\n\nh,i\r\n\r\na,1\r\n"b\r\nb\nb\rb",2\r\n\r\n\r\n , \r\nc,3\r\n"\r\n","\n"\nd,4\n\n"e",5';
    expect((await rowsOf(text, length)).rows).toEqual([
      [5, 'a', '1'],
      [6, 'b\r\nb\nb\rb', '2'],
      [13, 'c', '3'],
      [17, 'd', '4'],
      [19, 'e', '5'],
    ]);
  },
);

test.each([',', ';', '\t'])('the separator %j is found on the header line', async (separator) => {
  const text = ['"a,;\t,;\t"', 'b', 'c'].join(separator);
  const { header, rows } = await rowsOf(`${text}\n1${separator}2${separator}3\n`, 2);
  expect(header).toEqual(['a,;\t,;\t', 'b', 'c']);
  expect(rows).toEqual([[2, '1', '2', '3']]);
});

test.each(['\n', '\r\n', '\r'])('the line end %j is found', async (end) => {
  const { rows, count } = await rowsOf(['a,b', '1,2', '', '3,4', ''].join(end), 4);
  expect(rows).toEqual([
    [2, '1', '2'],
    [4, '3', '4'],
  ]);
  expect(count).toBe(2);
});

test('a file that mixes CRLF and LF is read as it looks', async () => {
  expect((await rowsOf('a,b\n1,"2"\r\n3,4\n')).rows).toEqual([
    [2, '1', '2'],
    [3, '3', '4'],
  ]);
});

test('lines are counted over more than one piece of 64 KiB', async () => {
  const many = Array.from({ length: 50_000 }, (_, i) => (i % 7 === 0 ? `"${i}\r\n",x` : `${i},x`));
  const { rows } = await rowsOf(`a,b\n${many.join('\n')}\n`);
  const lines = many.reduce<number[]>(
    (at, row) => [...at.slice(-1), (at.at(-1) ?? 2) + row.split('\n').length],
    [],
  );
  expect(rows).toHaveLength(50_000);
  expect(rows.at(-1)?.[0]).toBe((lines[1] as number) - 1);
});

test.each(['', '\n\n', '  \r\n', '\ufeff'])('a file without a header is refused: %j', async (text) => {
  await expect(rowsOf(text)).rejects.toMatchObject({
    exitCode: 3,
    faults: [{ code: 'empty-file', file: 'a.csv' }],
  });
});

test('a quote that never closes is refused with the line of its row', async () => {
  const fault = { code: 'unclosed-quote', file: 'a.csv', line: 3 };
  await expect(rowsOf('a,b\n1,2\n"3,4\n5,6\n')).rejects.toMatchObject({ exitCode: 3, faults: [fault] });
  const long = `a,b\n1,2\n"3,${'x'.repeat(1_100_000)}`;
  await expect(rowsOf(long)).rejects.toMatchObject({ exitCode: 3, faults: [fault] });
});

test('UTF-16 without a byte-order mark is named as what it is', async () => {
  const fault = { code: 'invalid-encoding' };
  await expect(rowsOf(Buffer.from('a,b\n1,2\n', 'utf16le'))).rejects.toMatchObject({
    exitCode: 3,
    faults: [fault],
  });
});

test('what a handler throws comes through', async () => {
  const read = readRows(memorySource('a.csv', 'a\n1\n'), null, () => () => {
    throw new RangeError('from the handler');
  });
  await expect(read).rejects.toThrow('from the handler');
});

test.each(['throws', 'stops at a quote that never closes'])(
  'the file is closed when reading %s',
  async (how) => {
    let closed = false;
    async function* open(): AsyncGenerator<Uint8Array> {
      try {
        yield Buffer.from('a,b\n1,2\n"');
        for (;;) yield Buffer.alloc(65536, 'x');
      } finally {
        closed = true;
      }
    }
    const source = { ...memorySource('a.csv', ''), open };
    const read = readRows(source, null, () => () => {
      if (how === 'throws') throw new RangeError('from the handler');
    });
    await expect(read).rejects.toThrow();
    expect(closed).toBe(true);
  },
);
