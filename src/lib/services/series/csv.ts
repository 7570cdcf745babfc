import Papa from 'papaparse';
import type { SeriesInfo } from './list.ts';
import type { Observation } from './observations.ts';

const NEWLINE = '\r\n';

/** The public file of a series (RFC 4180): `period,value`, a missing value empty, an input's digits as its file has them. */
export function csvOf(_series: SeriesInfo, observations: Observation[]): string {
  return file(
    ['period', 'value'],
    observations.map((row) => [row.period, digitsOf(row)]),
  );
}

/** The API's long form (RFC 4180): `series,period,value,status,release,published_at`. */
export function longCsvOf(series: SeriesInfo, observations: Observation[]): string {
  return file(
    ['series', 'period', 'value', 'status', 'release', 'published_at'],
    observations.map((row) => [
      series.id,
      row.period,
      digitsOf(row),
      row.status,
      row.releaseId,
      row.publishedAt.toISOString(),
    ]),
  );
}

function digitsOf({ digits, value }: Observation): string {
  return digits ?? (value === null ? '' : String(value));
}

function file(fields: string[], data: string[][]): string {
  return `${Papa.unparse({ fields, data }, { newline: NEWLINE })}${NEWLINE}`;
}
