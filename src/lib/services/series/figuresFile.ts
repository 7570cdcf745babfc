import Papa from 'papaparse';
import { addPeriods, periodDifference, periodsFrom } from '../../econ/periods.ts';
import type { ComputeRequest, LevelSeries } from '../../econ/types.ts';
import { INPUT_CONCEPTS, type ReleaseValue } from './concepts.ts';

/** A release's whole computed history as CSV (RFC 4180): `indicator,period,value,lower,upper`, empty where null. */
export function figuresFile(values: ReleaseValue[]): string {
  const columns = ['indicator', 'period', 'value', 'lower', 'upper'] as const;
  return `${Papa.unparse(values, { columns: [...columns], newline: '\r\n' })}\r\n`;
}

/** The levels a release was computed from, as the desk loads them: `period,money,prices,activity`, empty where missing. */
export function inputsFile(request: ComputeRequest): string {
  const { frequency } = request;
  const given = INPUT_CONCEPTS.flatMap((concept): [string, LevelSeries][] => {
    const series = request[concept];
    return series ? [[concept, series]] : [];
  });
  const first = given.map(([, series]) => series.start).toSorted()[0]!;
  const last = given
    .map(([, { start, values }]) => addPeriods(start, values.length - 1))
    .toSorted()
    .at(-1)!;
  const periods = periodsFrom(first, periodDifference(first, last) + 1, frequency);
  const rows = periods.map((period) => [
    period,
    ...given.map(([, { start, values }]) => values[periodDifference(start, period)] ?? ''),
  ]);
  const fields = ['period', ...given.map(([concept]) => concept)];
  return `${Papa.unparse({ fields, data: rows }, { newline: '\r\n' })}\r\n`;
}
