import Papa from 'papaparse';
import { addPeriods, frequencyOf, PERIOD_FORM, periodDifference } from '../../econ/periods.ts';
import type { Frequency } from '../../econ/types.ts';
import { CONCEPTS, type Concept } from '../economies/create.ts';
import { decodeCsv } from './decode.ts';
import { FaultList, quoted } from './faults.ts';

/** One series of a file: levels of consecutive periods, in the digits of the file. */
export interface FileSeries {
  concept: Concept;
  start: string;
  values: string[];
}

interface Line {
  number: number;
  cells: string[];
}

const HEADER = 'the header period,money with prices and activity where there are any';
const LEVEL = 'a number above zero, such as 103.25';

/**
 * Reads a data file `period,money,prices,activity`: the series in it, money first. The columns prices and activity
 * may be missing, and cells be empty before a series starts or after it ends.
 * @throws VintageFileError with every fault; ServiceError `too_large`
 */
export function parseVintage(bytes: Uint8Array, frequency: Frequency): FileSeries[] {
  const faults = new FaultList();
  const [header, ...lines] = linesOf(decodeCsv(bytes), faults);
  const columns = readHeader(header, faults);
  faults.refuseAny();
  if (lines.length === 0) {
    faults.add((header?.number ?? 0) + 1, '', 'the end of the file', 'one line a period');
    faults.refuseAny();
  }
  const whole = lines.filter((line) => hasAllCells(line, columns, faults));
  const periods = readPeriods(whole, columns.indexOf('period'), frequency, faults);
  const series = CONCEPTS.flatMap((concept) => {
    const at = columns.indexOf(concept);
    return at < 0 ? [] : (readLevels(whole, at, concept, faults) ?? []);
  });
  faults.refuseAny();
  return series.map(({ concept, from, values }) => ({
    concept,
    start: periods[from] as string,
    values,
  }));
}

/** The file's lines that are not blank, with the number an editor shows for each. */
function linesOf(text: string, faults: FaultList): Line[] {
  const { data, errors } = Papa.parse<string[]>(text.replace(/^\ufeff/, ''), { delimiter: ',' });
  const lines: Line[] = [];
  const numbers: number[] = [];
  let number = 1;
  for (const cells of data) {
    numbers.push(number);
    if (cells.some((cell) => cell.trim() !== '')) {
      lines.push({ number, cells: cells.map((cell) => cell.trim()) });
    }
    number += 1 + cells.join('').split('\n').length - 1;
  }
  for (const error of errors) {
    if (error.type !== 'Quotes') continue;
    const line = numbers[error.row ?? 0] ?? 0;
    faults.add(line, '', 'a quotation mark that is not closed', 'cells without quotation marks');
  }
  return lines;
}

/** Names of the columns in their order. */
function readHeader(header: Line | undefined, faults: FaultList): string[] {
  if (!header) {
    faults.add(1, '', 'blank lines only', HEADER);
    return [];
  }
  const { number, cells } = header;
  const known: string[] = ['period', ...CONCEPTS];
  if (cells.length === 1 && /[;\t|]/.test(cells[0] ?? '')) {
    faults.add(number, '', quoted(cells[0] ?? ''), `cells separated by commas: ${HEADER}`);
    return [];
  }
  if (frequencyOf(cells[0] ?? '') !== null) {
    faults.add(number, '', quoted(cells.join(',')), HEADER);
    return [];
  }
  cells.forEach((name, index) => {
    if (!known.includes(name)) {
      faults.add(number, `column ${index + 1}`, quoted(name), `one of ${known.join(', ')}`);
    } else if (cells.indexOf(name) < index) {
      faults.add(number, name, `a second column ${quoted(name)}`, 'each column once');
    }
  });
  for (const name of ['period', 'money']) {
    if (!cells.includes(name)) faults.add(number, name, 'no such column', HEADER);
  }
  return cells;
}

function hasAllCells({ number, cells }: Line, columns: string[], faults: FaultList): boolean {
  if (cells.length === columns.length) return true;
  const found = `${cells.length} cells: ${quoted(cells.join(','))}`;
  const decimals = cells.length > columns.length ? ', with a point before decimals' : '';
  faults.add(number, '', found, `${columns.length} cells, as in the header${decimals}`);
  return false;
}

/** The period of each line; wrong ones are told once, and the next line is held against what stands here. */
function readPeriods(
  lines: Line[],
  column: number,
  frequency: Frequency,
  faults: FaultList,
): string[] {
  const seen = new Map<string, number>();
  let expected: string | null = null;
  let before: number | null = null;
  return lines.map(({ number, cells }) => {
    const period = cells[column] ?? '';
    if (frequencyOf(period) !== frequency) {
      faults.add(number, 'period', quoted(period), PERIOD_FORM[frequency]);
      expected = expected && next(expected);
      return period;
    }
    const first = seen.get(period);
    // A line left out for its cells is told already; the gap it leaves is no second fault.
    const leftOut = before !== null && number !== before + 1;
    if (first !== undefined) {
      faults.add(number, 'period', `${period} again, after line ${first}`, 'each period once');
    } else if (expected !== null && period !== expected && !leftOut) {
      faults.add(number, 'period', period + jump(expected, period), expected);
    }
    seen.set(period, first ?? number);
    before = number;
    if (first === undefined) expected = next(period);
    return period;
  });
}

function next(period: string): string | null {
  return period.startsWith('9999') ? null : addPeriods(period, 1);
}

function jump(expected: string, found: string): string {
  const missing = periodDifference(expected, found);
  if (missing < 0) return ', earlier than the line before';
  return missing === 1 ? ` (${expected} is missing)` : ` (${missing} periods are missing)`;
}

/** A column's levels from its first to its last; null where it has none. */
function readLevels(
  lines: Line[],
  column: number,
  concept: Concept,
  faults: FaultList,
): { concept: Concept; from: number; values: string[] } | null {
  const cells = lines.map((line) => line.cells[column] ?? '');
  const from = cells.findIndex((cell) => cell !== '');
  if (from < 0) {
    const at = lines[0]?.number;
    if (at !== undefined) faults.add(at, concept, 'a column of empty cells', LEVEL);
    return null;
  }
  const to = cells.findLastIndex((cell) => cell !== '');
  const values = cells.slice(from, to + 1);
  values.forEach((cell, i) => {
    const expected = expectedInstead(cell);
    if (expected) faults.add(lines[from + i]?.number ?? 0, concept, quoted(cell), expected);
  });
  return { concept, from, values };
}

const DIGITS = /^[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d{1,3})?$/;

/** What should stand in place of a cell; null where the cell is a level. */
function expectedInstead(cell: string): string | null {
  if (cell === '') {
    return `${LEVEL}: cells may be empty only before a series starts or after it ends`;
  }
  if (!DIGITS.test(cell)) {
    const separators = /^[\d\s.,']+$/.test(cell) ? ', without separators between thousands' : '';
    return LEVEL + separators;
  }
  const level = Number(cell);
  if (!(level > 0)) return 'a level above zero, since its logarithm is taken';
  if (!Number.isFinite(level) || cell.length > 40) return 'a number of at most 40 signs';
  return null;
}
