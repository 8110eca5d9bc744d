import { describe, expect, test } from 'vitest';
import { dayNumber, isoDate } from '../../src/calendar.js';
import { dateReader } from '../../src/ingest/dates.js';
import { datePattern } from '../../src/settings/values.js';

function read(text: string, dateFormat: string | null = null): string {
  const date = dateReader(dateFormat)(text);
  return 'code' in date ? date.code : `${isoDate(date.from)} ${isoDate(date.to - 1)} ${date.grain}`;
}

describe('ISO 8601', () => {
  test.each([
    ['2026-10-31', '2026-10-31 2026-10-31 day'],
    ['2024-02-29', '2024-02-29 2024-02-29 day'],
    ['2026-10', '2026-10-01 2026-10-31 month'],
    ['2026-Q4', '2026-10-01 2026-12-31 quarter'],
    // ISO 8601 week dates as Wikipedia's "ISO week date" lists them: 2009-W01-1 is 2008-12-29, 2009-W53-7 is 2010-01-03
    ['2009-W01', '2008-12-29 2009-01-04 week'],
    ['2009-W53', '2009-12-28 2010-01-03 week'],
    ['2026-10-31T23:59:59', '2026-10-31 2026-10-31 day'],
    ['2026-10-31T23:59:59.999Z', '2026-10-31 2026-10-31 day'],
    ['2026-10-31T00:30+14:00', '2026-10-31 2026-10-31 day'],
    ['2026-10-31 08:15', '2026-10-31 2026-10-31 day'],
    ['2026-10-31T0815-0700', '2026-10-31 2026-10-31 day'],
    // ISO 8601 (from memory): 24:00 is the end of a day, second 60 a leap second
    ['2026-10-31T24:00', '2026-10-31 2026-10-31 day'],
    ['2016-12-31T23:59:60Z', '2016-12-31 2016-12-31 day'],
  ])('%s', (text, days) => expect(read(text)).toBe(days));

  test.each([
    '2026-02-29',
    '2026-13',
    '2026-10-32',
    '2026-Q5',
    '2010-W53',
    '2026',
    '20261031',
    '45960',
    'soon',
    '2026-10-31T',
    '2026-10-31T25:00',
    '2026-10-31T24:01',
    '2026-10-31 23:60',
    '2026-10-31T2359:61',
    '2026-10-31T08:15+24:00',
    '2026-10-31T08:15+01:75',
    '1026-10-31',
  ])('%s is not a date here', (text) => expect(read(text)).toBe('unreadable-date'));
});

test.each(['03/04/2026', '3.4.2026', '03-04-26', '12/12/2026'])('%s could be read two ways', (text) => {
  expect(read(text)).toBe('ambiguous-date');
});

test('the message names the patterns to set', () => {
  expect(dateReader(null)('03/04/2026')).toMatchObject({
    message: expect.stringContaining('dd/MM/yyyy or to MM/dd/yyyy'),
  });
  expect(dateReader(null)('31.10.2026')).toMatchObject({
    code: 'unreadable-date',
    message: expect.stringContaining('dd.MM.yyyy'),
  });
  expect(dateReader(null)('10-31-26')).toMatchObject({
    code: 'unreadable-date',
    message: expect.stringContaining('MM-dd-yy'),
  });
});

describe('a date-fns pattern', () => {
  test.each([
    ['dd.MM.yyyy', '31.10.2026', '2026-10-31 2026-10-31 day'],
    ['d/M/yy', '3/4/26', '2026-04-03 2026-04-03 day'],
    ['d/M/yy', '3/4/99', '1999-04-03 1999-04-03 day'],
    ['MM/yyyy', '10/2026', '2026-10-01 2026-10-31 month'],
    ['MMM yyyy', 'Oct 2026', '2026-10-01 2026-10-31 month'],
    ["yyyy 'day' MM", '2026 day 10', '2026-10-01 2026-10-31 month'],
    ["RRRR'W'II", '2009W01', '2008-12-29 2009-01-04 week'],
    ['yyyy-QQQ', '2026-Q4', '2026-10-01 2026-12-31 quarter'],
    ['dd.MM.yyyy HH:mm', '31.10.2026 23:59', '2026-10-31 2026-10-31 day'],
    ['dd.MM.yyyy', '2026-10-31', 'unreadable-date'],
    ['dd.MM.yyyy', '31.02.2026', 'unreadable-date'],
    ['dd.MM.yyyy', '31.10.26', 'unreadable-date'],
  ])('%s reads %s as %s', (pattern, text, days) => expect(read(text, pattern)).toBe(days));

  test('no time zone matters', () => {
    const zone = process.env.TZ;
    try {
      for (const place of ['Pacific/Apia', 'America/Los_Angeles', 'UTC']) {
        process.env.TZ = place;
        // Samoa skipped 2011-12-30 (IANA time zone database)
        expect(read('30.12.2011', 'dd.MM.yyyy')).toBe('2011-12-30 2011-12-30 day');
      }
    } finally {
      if (zone === undefined) delete process.env.TZ;
      else process.env.TZ = zone;
    }
  });

  // A date-time's calendar date counts, and date-fns would move it to the reference zone (date-fns, Unicode tokens).
  test.each(['X', 'x', 'xxx', 'O', 'z', 't', 'T', 'P', 'Pp'])('%s is refused beside a date', (token) => {
    const pattern = `yyyy-MM-dd'T'HH:mm ${token}`;
    expect(() => dateReader(pattern)).toThrow(`invalid dateFormat ${pattern}: `);
  });

  test('letters of the refused tokens may stand in quotes', () => {
    expect(read('2024-03-05T23:59 x', "yyyy-MM-dd'T'HH:mm 'x'")).toBe('2024-03-05 2024-03-05 day');
    expect(read('2024-03-05T23:59:59-11:00')).toBe('2024-03-05 2024-03-05 day');
  });

  test.each(['yyyy', 'YYYY-MM-DD', 'dd.MM.yyyy n', 'dd.MM.', 'xx', ''])('%s is refused', (pattern) => {
    expect(() => dateReader(pattern)).toThrow(`invalid dateFormat ${pattern}`);
  });

  // None of them tells one day from all others of its year.
  test.each(['EEE yyyy', 'EEEE yyyy', 'yyyy d', 'i RRRR', 'yyyy MM EEE', 'yyyy w'])(
    '%s, which names a day without its place in the year, is refused by the records and by the settings',
    (pattern) => {
      expect(() => dateReader(pattern)).toThrow(`invalid dateFormat ${pattern}`);
      expect(datePattern.safeParse(pattern).success).toBe(false);
    },
  );

  test.each(["d 'o''clock D' M yyyy", "dd.MM.yyyy 'x", "i'. of' II RRRR"])(
    '%s, with refused letters in quotes or a weekday beside its week, is accepted by both',
    (pattern) => {
      expect(() => dateReader(pattern)).not.toThrow();
      expect(datePattern.safeParse(pattern).success).toBe(true);
    },
  );
});

test('equal days and grain have equal keys, others have not', () => {
  const reader = dateReader(null);
  const key = (text: string) => {
    const date = reader(text);
    return 'code' in date ? text : date.key;
  };
  expect(key('2026-10-31T08:00')).toBe(key('2026-10-31'));
  const texts = ['2026-01-01', '2026-01', '2026-Q1', '2024-01-01', '2024-W01'];
  expect(new Set(texts.map(key)).size).toBe(5);
});

test('the cache of dates forgets and does not fail', () => {
  const reader = dateReader(null);
  for (let day = 0; day < 50_000; day++) reader(isoDate(day));
  expect(reader('1970-01-02')).toMatchObject({ from: dayNumber(1970, 1, 2) });
});
