import { describe, expect, test } from 'vitest';
import { FAULTS_TOLD, VintageFileError } from '../../src/lib/services/vintages/faults.ts';
import { parseVintage } from '../../src/lib/services/vintages/parse.ts';
import { text } from './desk.ts';

const monthly = (content: string | Uint8Array) =>
  parseVintage(typeof content === 'string' ? text(content) : content, 'monthly');

/** The faults of a file that must be refused. */
function faultsOf(content: string | Uint8Array) {
  try {
    monthly(content);
  } catch (error) {
    if (error instanceof VintageFileError) return error.fileFaults;
    throw error;
  }
  throw new Error('The file was not refused.');
}

describe('parseVintage', () => {
  test('keeps the digits of the file', () => {
    const [money] = monthly('period,money\n2031-01,100.10\n2031-02,0.10000000000000000001\n');
    expect(money).toEqual({
      concept: 'money',
      start: '2031-01',
      values: ['100.10', '0.10000000000000000001'],
    });
  });

  test('lets a series start later and end earlier than the file', () => {
    const file = 'period,money,prices,activity\n2031-01,1,,\n2031-02,2,5,\n2031-03,3,,7\n';
    expect(monthly(file)).toEqual([
      { concept: 'money', start: '2031-01', values: ['1', '2', '3'] },
      { concept: 'prices', start: '2031-02', values: ['5'] },
      { concept: 'activity', start: '2031-03', values: ['7'] },
    ]);
  });

  test('reads quarters and years in an economy of that frequency', () => {
    const quarters = parseVintage(text('period,money\n2030-Q4,1\n2031-Q1,2'), 'quarterly');
    expect(quarters[0]?.start).toBe('2030-Q4');
    expect(parseVintage(text('period,money\n1970,1\n1971,2'), 'annual')[0]?.start).toBe('1970');
  });

  test('takes a byte-order mark, Windows line ends, blank lines and columns in another order', () => {
    const file = '\ufeffperiod,prices,money\r\n2031-01,5,1\r\n\r\n2031-02,6,2\r\n\r\n';
    expect(monthly(file)[0]?.values).toEqual(['1', '2']);
  });

  test('names the place, what was found and what was expected of every fault at once', () => {
    const file = [
      'period,money,prices',
      '2031-01,100,90',
      '2031-02,0,90.5',
      '2031-02,101,n/a',
      '2031-05,102,-3',
      'May 2031,103,91',
      '2031-07,104',
      '2031-08,"1,040",92',
    ].join('\n');
    const faults = faultsOf(file).map(({ line, column, found }) => ({ line, column, found }));
    expect(faults).toEqual([
      { line: 3, column: 'money', found: '“0”' },
      { line: 4, column: 'period', found: '2031-02 again, after line 3' },
      { line: 4, column: 'prices', found: '“n/a”' },
      { line: 5, column: 'period', found: '2031-05 (2 periods are missing)' },
      { line: 5, column: 'prices', found: '“-3”' },
      { line: 6, column: 'period', found: '“May 2031”' },
      { line: 7, column: '', found: '2 cells: “2031-07,104”' },
      { line: 8, column: 'money', found: '“1,040”' },
    ]);
    expect(faultsOf(file)[0]?.expected).toBe('a level above zero, since its logarithm is taken');
    expect(faultsOf(file)[3]?.expected).toBe('2031-03');
  });

  test.each([
    ['an empty file', '', 0, '', 'an empty file'],
    ['a header alone', 'period,money\n', 2, '', 'the end of the file'],
    ['no header', '2031-01,100\n2031-02,101\n', 1, '', '“2031-01,100”'],
    ['semicolons', 'period;money\n2031-01;100\n', 1, '', '“period;money”'],
    ['an unknown column', 'period,money,wages\n2031-01,1,2\n', 1, 'column 3', '“wages”'],
    ['a column twice', 'period,money,money\n2031-01,1,2\n', 1, 'money', 'a second column “money”'],
    ['no money', 'period,prices\n2031-01,1\n', 1, 'money', 'no such column'],
    [
      'a missing month',
      'period,money\n2031-01,1\n2031-03,2\n',
      3,
      'period',
      '2031-03 (2031-02 is missing)',
    ],
    [
      'months backwards',
      'period,money\n2031-02,1\n2031-01,2\n',
      3,
      'period',
      '2031-01, earlier than the line before',
    ],
    [
      'an empty cell inside',
      'period,money\n2031-01,1\n2031-02,\n2031-03,2\n',
      3,
      'money',
      'an empty cell',
    ],
    [
      'an empty column',
      'period,money,prices\n2031-01,1,\n',
      2,
      'prices',
      'a column of empty cells',
    ],
    ['a negative level', 'period,money\n2031-01,-1\n', 2, 'money', '“-1”'],
    ['infinity', 'period,money\n2031-01,Infinity\n', 2, 'money', '“Infinity”'],
    ['a number beyond doubles', 'period,money\n2031-01,1e999\n', 2, 'money', '“1e999”'],
    [
      'an open quotation mark',
      'period,money\n2031-01,1\n2031-02,"2\n',
      3,
      '',
      'a quotation mark that is not closed',
    ],
  ])('tells %s', (_name, file, line, column, found) => {
    expect(faultsOf(file)).toContainEqual(expect.objectContaining({ line, column, found }));
  });

  test.each([
    [
      'a zipped spreadsheet',
      [0x50, 0x4b, 3, 4, 20],
      'a spreadsheet or another zipped file (it begins with PK)',
    ],
    [
      'an older spreadsheet',
      [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1],
      'an older spreadsheet or document',
    ],
    ['UTF-16', [0xff, 0xfe, 0x70, 0], 'text in UTF-16'],
    ['zero bytes', [0x70, 0x0a, 0x00], 'a zero byte, which no text has'],
    ['Latin-1', [0x70, 0x0a, 0x61, 0xe9, 0x2c], 'a sign that is not UTF-8 after “a”'],
  ])('tells %s', (_name, bytes, found) => {
    expect(faultsOf(Uint8Array.from(bytes))).toEqual([expect.objectContaining({ found })]);
  });

  test('says at which line the text stops being UTF-8', () => {
    expect(faultsOf(Uint8Array.from([0x70, 0x0a, 0x61, 0xe9]))[0]?.line).toBe(2);
  });

  test('lists the first hundred faults and counts the rest', () => {
    const rows = Array.from({ length: 150 }, (_, i) => `${1900 + i}-01,x`);
    const refused = () => monthly(['period,money', ...rows].join('\n'));
    expect(refused).toThrow(/299 faults.*The first 100 are listed/s);
    expect(faultsOf(['period,money', ...rows].join('\n'))).toHaveLength(FAULTS_TOLD);
  });

  test('refuses a file of 40 MB by its size', () => {
    expect(() => monthly(new Uint8Array(40 * 1024 * 1024))).toThrow(
      /has 40.0 MB and at most 5 MB are read/,
    );
  });
});
