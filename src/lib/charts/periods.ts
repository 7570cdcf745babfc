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

export interface PeriodParts {
  year: number;
  /** 1 to 12, 1 to 4, or 1. */
  position: number;
  perYear: 12 | 4 | 1;
}

/** The parts of `2031-08`, `2000-Q4` or `1970`. */
export function periodParts(period: string): PeriodParts {
  const match = /^(\d{4})(?:-(Q[1-4]|0[1-9]|1[0-2]))?$/.exec(period);
  if (!match) throw new RangeError(`${period} is not a month, a quarter or a year.`);
  const year = Number(match[1]);
  const within = match[2];
  if (within === undefined) return { year, position: 1, perYear: 1 };
  if (within.startsWith('Q')) return { year, position: Number(within[1]), perYear: 4 };
  return { year, position: Number(within), perYear: 12 };
}

/** A period as readers see it: "August 2031" or "Aug 2031", "Q4 2000", "1970". */
export function periodLabel(period: string, length: LabelLength = 'long'): string {
  const { year, position, perYear } = periodParts(period);
  if (perYear === 1) return String(year);
  if (perYear === 4) return `Q${position} ${year}`;
  return `${monthName(position, length)} ${year}`;
}

/** What one period of a series is called: "month", "quarter", "year". */
export function periodNoun(period: string): 'month' | 'quarter' | 'year' {
  const { perYear } = periodParts(period);
  return perYear === 12 ? 'month' : perYear === 4 ? 'quarter' : 'year';
}
