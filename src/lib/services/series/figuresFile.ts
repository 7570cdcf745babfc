import Papa from 'papaparse';
import type { ReleaseValue } from './concepts.ts';

/** A release's whole computed history as CSV (RFC 4180): `indicator,period,value,lower,upper`, empty where null. */
export function figuresFile(values: ReleaseValue[]): string {
  const columns = ['indicator', 'period', 'value', 'lower', 'upper'] as const;
  return `${Papa.unparse(values, { columns: [...columns], newline: '\r\n' })}\r\n`;
}
