import type { Frequency } from './types.ts';

/** Periods a year, the method's f. */
export const PERIODS_A_YEAR: Record<Frequency, number> = { monthly: 12, quarterly: 4, annual: 1 };

/** A period as a count of periods since year 0: 12 · year + month − 1, 4 · year + quarter − 1, or the year. */
export interface Period {
  frequency: Frequency;
  index: number;
}

const MONTH = /^(\d{4})-(0[1-9]|1[0-2])$/;
const QUARTER = /^(\d{4})-Q([1-4])$/;
const YEAR = /^\d{4}$/;

/** How a period of each frequency is written, for messages: "a month such as 2031-04". */
export const PERIOD_FORM: Record<Frequency, string> = {
  monthly: 'a month such as 2031-04',
  quarterly: 'a quarter such as 2031-Q2',
  annual: 'a year such as 2031',
};

/** Frequency that the form of `text` says, or null when it is no ISO 8601 month, quarter or year. */
export function frequencyOf(text: string): Frequency | null {
  if (MONTH.test(text)) return 'monthly';
  if (QUARTER.test(text)) return 'quarterly';
  return YEAR.test(text) ? 'annual' : null;
}

/**
 * Reads a month `2031-04`, a quarter `2031-Q2` or a year `2031`.
 * @throws RangeError when `text` is none of these, or not of the `frequency` asked for.
 */
export function parsePeriod(text: string, frequency?: Frequency): Period {
  const found = frequencyOf(text);
  if (found === null || (frequency !== undefined && found !== frequency)) {
    const forms = frequency ? PERIOD_FORM[frequency] : Object.values(PERIOD_FORM).join(', ');
    throw new RangeError(`"${text}" is not ${forms}.`);
  }
  const year = Number(text.slice(0, 4));
  if (found === 'annual') return { frequency: found, index: year };
  const part = Number(text.slice(found === 'monthly' ? 5 : 6));
  return { frequency: found, index: year * PERIODS_A_YEAR[found] + part - 1 };
}

/**
 * Writes a period in ISO 8601: `2031-04`, `2031-Q2` or `2031`.
 * @throws RangeError outside the years 0000 to 9999.
 */
export function formatPeriod({ frequency, index }: Period): string {
  const perYear = PERIODS_A_YEAR[frequency];
  const year = Math.floor(index / perYear);
  if (!(year >= 0 && year <= 9999)) {
    throw new RangeError(`The year ${year} is outside 0000 to 9999.`);
  }
  const text = String(year).padStart(4, '0');
  const part = index - year * perYear + 1;
  if (frequency === 'annual') return text;
  return frequency === 'monthly' ? `${text}-${String(part).padStart(2, '0')}` : `${text}-Q${part}`;
}

/** The period `count` periods after `period` (before, when negative); both as ISO 8601 texts. */
export function addPeriods(period: string, count: number): string {
  const { frequency, index } = parsePeriod(period);
  return formatPeriod({ frequency, index: index + count });
}

/**
 * `count` consecutive periods from `start` on, as ISO 8601 texts.
 * @throws RangeError when `start` is not a period of that frequency or the run leaves the years 0000 to 9999.
 */
export function periodsFrom(start: string, count: number, frequency: Frequency): string[] {
  const { index } = parsePeriod(start, frequency);
  return Array.from({ length: count }, (_, i) => formatPeriod({ frequency, index: index + i }));
}

/** How many periods `to` lies after `from`: 0 for the same, negative when earlier. RangeError when frequencies differ. */
export function periodDifference(from: string, to: string): number {
  const first = parsePeriod(from);
  return parsePeriod(to, first.frequency).index - first.index;
}

/** Order of two periods of one frequency for sorting: negative, zero or positive. */
export function comparePeriods(a: string, b: string): number {
  return periodDifference(b, a);
}

/** Month or quarter of the year of a period index, counted from 0; always 0 for annual data. */
export function seasonOf(index: number, frequency: Frequency): number {
  const perYear = PERIODS_A_YEAR[frequency];
  return index - Math.floor(index / perYear) * perYear;
}
