import { describe, expect, test } from 'vitest';
import { bring, drawn, placesOf, type Changes } from '../bring';

/** One node table of ids and entries, a row each. */
const nodes = (...entries: string[]): Record<string, string> => ({
  'nodes.csv': `id;entry\n${entries.map((entry, at) => `n${at + 1};${entry}\n`).join('')}`,
});

const entries = async (files: Record<string, string>, changes: Changes = {}) =>
  drawn(await bring(files, changes)).nodes.map((text) => text.replace(/^n\d+@/, ''));

async function fault(files: Record<string, string>, changes: Changes = {}) {
  const brought = await bring(files, changes);
  expect(brought.network).toBeNull();
  return { places: placesOf(brought), message: brought.issues[0]?.message ?? '' };
}

describe('numbers', () => {
  test.each([
    ['-0', '0'],
    ['1e-320', '1e-320'],
    ['9007199254740991', '9007199254740991'],
    ['-1.5', '-1.5'],
    ['+3', '3'],
    ['.5', '0.5'],
    ['2.', '2'],
    ['1E3', '1000'],
  ])('%s is the number %s', async (text, value) => {
    expect(await entries(nodes('1', text))).toEqual(['1', value]);
  });

  test.each([
    ['NaN', /not a number that orders/],
    ['Infinity', /not a number that orders/],
    ['-inf', /not a number that orders/],
    ['1e309', /larger than a number/],
    ['9007199254740993', /told apart/],
    ['0x10', /neither a plain number/],
    ['1.234.567', /between its thousands/],
    ['1 234', /between its thousands/],
    ['12 days', /neither a plain number/],
    ['٣', /neither a plain number/],
  ])('%s is refused by line and column', async (text, message) => {
    const found = await fault(nodes('1', '2', text));
    expect(found.places).toEqual(['nodes.csv:4:entry']);
    expect(found.message).toMatch(message);
  });

  test('a decimal comma is read where the file has decimal commas, and -0 stays 0', async () => {
    expect(await entries(nodes('1,5', '-2,25', '-0', '1e3'))).toEqual([
      '1.5',
      '-2.25',
      '0',
      '1000',
    ]);
  });

  test('a point among decimal commas is refused, and a comma among points', async () => {
    expect((await fault(nodes('1,5', '2,5', '2.5'))).places).toEqual(['nodes.csv:4:entry']);
    const comma = await fault(nodes('1.5', '2.5', '1,5'));
    expect(comma.places).toEqual(['nodes.csv:4:entry']);
    expect(comma.message).toMatch(/decimal comma/);
  });

  test('seconds since 1970 among milliseconds are refused', async () => {
    const found = await fault(nodes('1700000000', '1700000000500', '1700000001'));
    expect(found.places).toEqual(['nodes.csv:3:entry']);
    expect(found.message).toMatch(/milliseconds/);
    expect(await entries(nodes('1700000000', '1700000001'))).toEqual(['1700000000', '1700000001']);
  });
});

describe('dates', () => {
  const DAY = 19_754; // 1 February 2024 is that many days after 1 January 1970.

  test.each([
    ['2024-02-01'],
    ['2024/02/01'],
    ['2024-2-1'],
    ['01.02.2024'],
    ['1 Feb 2024'],
    ['1 February 2024'],
    ['01-Feb-2024'],
    ['February 1, 2024'],
  ])('%s is 1 February 2024', async (text) => {
    expect(await entries(nodes(text, '2024-02-02'))).toEqual([String(DAY), String(DAY + 1)]);
  });

  test('29 February is a day of leap years alone', async () => {
    expect(await entries(nodes('2024-02-29', '29/02/2000'))).toEqual(['19782', '11016']);
    for (const text of ['2023-02-29', '29/02/1900', '29 Feb 2023']) {
      const found = await fault(nodes('2024-01-01', text));
      expect([text, found.places, found.message]).toEqual([
        text,
        ['nodes.csv:3:entry'],
        expect.stringMatching(/calendar has no day/),
      ]);
    }
  });

  test.each([
    ['0000-01-01', /no day/],
    ['2024-13-01', /no day/],
    ['2024-00', /no month/],
    ['01/02/24', /two digits/],
    ['2024-02-01T24:00', /time of day/],
    ['2024-02-01T12:60', /time of day/],
    ['2024-02-01T12:00+15:00', /real zones|real zone/],
    ['2024-02-01 13:00 PM', /time of day/],
    ['2024-02-01 noon', /neither/],
    ['1 Foo 2024', /neither/],
  ])('%s is refused', async (text, message) => {
    const found = await fault(nodes('2024-01-01', '2024-01-02', text));
    expect(found.places).toEqual(['nodes.csv:4:entry']);
    expect(found.message).toMatch(message);
  });

  test('01/02/2024 is asked about once, however many rows have it', async () => {
    const files = nodes('01/02/2024', '03/04/2024', '2024-05-05');
    const { network, issues, questions, asked } = await bring(files);
    expect(network).toBeNull();
    expect(issues).toEqual([]);
    expect(questions).toEqual(asked);
    expect(questions).toMatchObject([
      { kind: 'day_order', file: 'nodes.csv', column: 'entry', blocking: true },
    ]);
    expect(questions[0]?.examples).toEqual(['01/02/2024', '03/04/2024']);
    expect((await entries(files, { dayOrder: 'day_first' }))[0]).toBe(String(DAY));
    expect((await entries(files, { dayOrder: 'month_first' }))[0]).toBe('19724');
  });

  test('one date that can be read in one way alone answers for its column', async () => {
    const day = await bring(nodes('01/02/2024', '13/02/2024'));
    expect([day.guessed.dayOrder, day.asked]).toEqual(['day_first', []]);
    expect(drawn(day).nodes[0]).toBe('n1@19754');
    const month = await bring(nodes('01/02/2024', '02/13/2024'));
    expect([month.guessed.dayOrder, drawn(month).nodes[0]]).toEqual(['month_first', 'n1@19724']);
  });

  test('a date that contradicts the order of day and month is refused', async () => {
    const found = await fault(nodes('13/02/2024', '14/02/2024', '02/13/2024'));
    expect(found.places).toEqual(['nodes.csv:4:entry']);
    expect(found.message).toMatch(/no month 13/);
  });

  test('the raw text stays beside the value', async () => {
    const { network } = await bring(nodes('13/02/2024', '1 Feb 2024'));
    expect(network?.nodes.map(({ entryRaw }) => entryRaw)).toEqual(['13/02/2024', '1 Feb 2024']);
  });

  test('a date among numbers, and a number among dates, are refused', async () => {
    expect((await fault(nodes('1', '2', '2024-01-01'))).places).toEqual(['nodes.csv:4:entry']);
    expect((await fault(nodes('2024-01-01', '2024-01-02', '7'))).places).toEqual([
      'nodes.csv:4:entry',
    ]);
  });
});

describe('dates with time', () => {
  test('zones are followed, fractions kept', async () => {
    const files = nodes(
      '1970-01-01T01:00+01:00',
      '1970-01-01 00:00:01.5Z',
      '1970-01-01T00:00:02.000001 UTC',
      '1969-12-31T19:00:03-0500',
    );
    expect(await entries(files)).toEqual(['0', '1.5', '2.000001', '3']);
  });

  test('hours of 12 with AM and PM are read', async () => {
    const files = nodes('1/13/1970 12:00 AM', '1/13/1970 12:30 PM', '1/13/1970 1:00 pm');
    expect(await entries(files)).toEqual(['1036800', '1081800', '1083600']);
  });

  test('times with a zone among times without are refused', async () => {
    const found = await fault(nodes('2024-01-01T10:00Z', '2024-01-02T10:00', '2024-01-03T10:00Z'));
    expect(found.places).toEqual(['nodes.csv:3:entry']);
    expect(found.message).toMatch(/line 2 differs/);
  });

  test('a month among times of day is an interval to its last second', async () => {
    expect(await entries(nodes('1970-01', '1970-01-02T00:00'))).toEqual([
      `${15 * 86_400}[0,${31 * 86_400 - 1}]`,
      '86400',
    ]);
  });
});

describe('years and months', () => {
  test('a month is the interval of its days, and its entry the middle', async () => {
    expect(await entries(nodes('1987-03', '02/1987', 'Feb 2024'))).toEqual([
      '6283[6268,6298]',
      '6253[6240,6267]',
      '19768[19754,19782]',
    ]);
  });

  test('a year beside dates is an interval, never 1 January', async () => {
    expect(await entries(nodes('1988', '1987-01-01'))).toEqual(['6756[6574,6939]', '6209']);
  });

  test('years alone are numbers until somebody says that they are dates', async () => {
    const files = nodes('1987', '1988');
    const { asked, found } = await bring(files);
    expect(asked).toMatchObject([{ kind: 'years', blocking: false }]);
    expect(found.windows.years).toBe(0);
    expect(await entries(files)).toEqual(['1987', '1988']);
    const dated = await bring(files, { years: 'dates' });
    expect(drawn(dated).nodes).toEqual(['n1@6391[6209,6573]', 'n2@6756[6574,6939]']);
    expect(dated.found.windows.years).toBe(2);
  });

  test('the last year that has four digits ends too, and year 0 is none', async () => {
    expect(await entries(nodes('9999', '9999-12'), { years: 'dates' })).toEqual([
      '2932714[2932532,2932896]',
      '2932881[2932866,2932896]',
    ]);
    expect((await fault(nodes('0000', '1990'), { years: 'dates' })).message).toMatch(/no year/);
  });
});

describe('windows', () => {
  const windowed = (...rows: string[]) => ({
    'nodes.csv': `id;entry;earliest;latest\n${rows.join('\n')}\n`,
  });

  test('earliest and latest columns give windows, a month its first and last day', async () => {
    expect(await entries(windowed('n1;5;4;6', 'n2;7;;', 'n3;8;;9'))).toEqual([
      '5[4,6]',
      '7',
      '8[null,9]',
    ]);
    expect(await entries(windowed('n1;1970-01-10;1970-01;1970-02'))).toEqual(['9[0,58]']);
  });

  test('a month narrowed by a window has its entry inside both', async () => {
    expect(await entries(windowed('n1;1970-01;1970-01-21;'))).toEqual(['25[20,30]']);
  });

  test.each([
    ['n1;5;6;', 'earliest', /after the entry/],
    ['n1;5;;4', 'latest', /before the entry/],
    ['n1;5;7;3', 'latest', /before the earliest/],
    ['n1;1970-01;1970-02-01;', 'earliest', /after the entry/],
  ])('%s is refused', async (row, field, message) => {
    const found = await fault(windowed(row));
    expect(found.places[0]).toBe(`nodes.csv:2:${field}`);
    expect(found.message).toMatch(message);
  });

  test('a tolerance gives a window to every node that has none', async () => {
    const { found, network } = await bring(windowed('n1;5;4;6', 'n2;7;;'), { tolerance: 3 });
    expect(network?.nodes[1]).toMatchObject({ earliest: 4, latest: 10, earliestRaw: '' });
    expect(found.windows).toMatchObject({ given: 1, tolerance: 1 });
  });

  test.each([-1, NaN, Infinity])('a tolerance of %s is refused', async (tolerance) => {
    expect((await fault(nodes('1'), { tolerance })).message).toMatch(/tolerance/);
  });
});
