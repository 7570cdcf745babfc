import { formatPeriod, frequencyOf, parsePeriod, PERIOD_FORM, PERIODS_A_YEAR } from '../periods.ts';
import type { Frequency, LevelSeries } from '../types.ts';
import { shown, type Path, type Reader } from './reader.ts';

const LAST_YEAR = 9999;

/**
 * Reads a series: `start`, `values` and, for levels, an optional `timing`.
 * @param kind `level`: strictly positive values; `growth`: any finite ones, and no timing.
 */
export function readSeries(
  reader: Reader,
  value: unknown,
  path: Path,
  kind: 'level' | 'growth',
  frequency: Frequency | undefined,
): LevelSeries | undefined {
  const name = String(path[0]).replace('_', ' ');
  const fields = reader.object(value, path, `The ${name} series`);
  if (fields === undefined) return undefined;
  reader.only(fields, path, kind === 'level' ? ['start', 'values', 'timing'] : ['start', 'values']);
  const start = readStart(reader, fields.start, [...path, 'start'], name, frequency);
  const values = readValues(reader, fields.values, [...path, 'values'], name, kind, start);
  const timing =
    kind === 'growth' || fields.timing === undefined
      ? undefined
      : reader.choice(fields.timing, [...path, 'timing'], `The timing of ${name}`, [
          'end',
          'average',
        ]);
  if (start === undefined || values === undefined) return undefined;
  return timing === undefined ? { start, values } : { start, values, timing };
}

function readStart(
  reader: Reader,
  value: unknown,
  path: Path,
  name: string,
  frequency: Frequency | undefined,
): string | undefined {
  const found = typeof value === 'string' ? frequencyOf(value) : null;
  if (found !== null && (frequency === undefined || found === frequency)) return value as string;
  const form = frequency
    ? `${PERIOD_FORM[frequency]}, as its frequency is ${frequency}`
    : 'a month, quarter or year';
  return reader.fault(path, `The start of ${name} must be ${form}, not ${shown(value)}.`);
}

function readValues(
  reader: Reader,
  value: unknown,
  path: Path,
  name: string,
  kind: 'level' | 'growth',
  start: string | undefined,
): number[] | undefined {
  if (!Array.isArray(value)) {
    return reader.fault(
      path,
      `The values of ${name} must be a list of numbers, not ${shown(value)}.`,
    );
  }
  if (value.length === 0) return reader.fault(path, `The ${name} series has no values.`);
  if (start !== undefined) {
    const { frequency, index } = parsePeriod(start);
    if (index + value.length > (LAST_YEAR + 1) * PERIODS_A_YEAR[frequency]) {
      return reader.fault(path, `The ${name} series runs past the year ${LAST_YEAR}.`);
    }
  }
  const before = reader.faults.length;
  for (let i = 0; i < value.length; i++) {
    const number: unknown = value[i];
    const finite = typeof number === 'number' && Number.isFinite(number);
    if (finite && (kind === 'growth' || number > 0)) continue;
    const period = start === undefined ? undefined : periodAt(start, i);
    const where =
      period === undefined ? `Value ${i + 1} of ${name}` : `The value of ${name} for ${period}`;
    const bounds =
      kind === 'growth' ? 'a number' : 'a number above zero, as its logarithm is taken';
    reader.fault([...path, i], `${where} must be ${bounds}, not ${shown(number)}.`, period);
  }
  return reader.faults.length === before ? (value as number[]) : undefined;
}

function periodAt(start: string, i: number): string {
  const { frequency, index } = parsePeriod(start);
  return formatPeriod({ frequency, index: index + i });
}
