import { parsePeriod, seasonOf } from '../econ/periods.ts';
import type { Frequency } from '../econ/types.ts';

const months = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
] as const;

export type LabelLength = 'short' | 'long';

/** A month's name: `monthName(8)` is "August", `monthName(8, 'short')` "Aug". */
export function monthName(month: number, length: LabelLength = 'long'): string {
  const name = months[month - 1];
  if (name === undefined) throw new RangeError(`There is no month ${month}.`);
  return length === 'long' ? name : name.slice(0, 3);
}

/** A period as readers see it: "August 2031" or "Aug 2031", "Q4 2000", "1970". */
export function periodLabel(period: string, length: LabelLength = 'long'): string {
  const { frequency, index } = parsePeriod(period);
  const year = period.slice(0, 4);
  if (frequency === 'annual') return year;
  const part = seasonOf(index, frequency) + 1;
  return frequency === 'quarterly' ? `Q${part} ${year}` : `${monthName(part, length)} ${year}`;
}

const nouns = { monthly: 'month', quarterly: 'quarter', annual: 'year' } as const satisfies Record<
  Frequency,
  string
>;

/** What one period of a series is called: "month", "quarter" or "year". */
export function periodNoun(period: string): 'month' | 'quarter' | 'year' {
  return nouns[parsePeriod(period).frequency];
}
