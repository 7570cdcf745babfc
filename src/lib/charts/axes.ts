import { parsePeriod, PERIODS_A_YEAR, seasonOf } from '../econ/periods.ts';
import { signed } from './figures.ts';
import type { FigureOptions } from './figures.ts';
import { labelSize } from './labels.ts';
import { periodLabel } from './periodLabels.ts';
import { textWidth } from './textWidth.ts';

/** 1, 2 or 5 times a power of ten: the smallest that cuts `size` into at most `parts` parts. */
export function tickStep(size: number, parts: number): number {
  const power = 10 ** Math.floor(Math.log10(size / parts));
  const ratio = size / parts / power - 1e-9;
  return (ratio <= 1 ? 1 : ratio <= 2 ? 2 : ratio <= 5 ? 5 : 10) * power;
}

/** Half the height of a symmetric scale, a whole number of ticks, that holds every finite value; 1 where all are 0. */
export function symmetricDomain(values: (number | null)[]): number {
  let largest = 0;
  for (const value of values) {
    if (value !== null && Number.isFinite(value)) largest = Math.max(largest, Math.abs(value));
  }
  // Below a hundredth of a point every figure prints as level or nearly so: a finer scale would only magnify it.
  if (largest < 0.01) return 1;
  const step = tickStep(largest, 4);
  return Math.ceil(largest / step - 1e-9) * step;
}

export interface ValueTick {
  value: number;
  label: string;
}

/** Ticks from `low` to `high` with signed labels, without 0, which is the datum. */
export function valueTicks(
  low: number,
  high: number,
  step: number,
  options: FigureOptions = {},
): ValueTick[] {
  const places = Math.max(0, Math.min(6, -Math.floor(Math.log10(step) + 1e-9)));
  const ticks: ValueTick[] = [];
  for (let i = Math.ceil(low / step - 1e-9); i <= Math.floor(high / step + 1e-9); i += 1) {
    if (i !== 0) ticks.push({ value: i * step, label: signed(i * step, places, options) });
  }
  return ticks;
}

/** Room that the widest of the tick labels needs left of the plot, with its gap, in px. */
export function tickRoom(ticks: ValueTick[]): number {
  return Math.ceil(Math.max(...ticks.map(({ label }) => textWidth(label, labelSize)), 24)) + 10;
}

export interface YearTick {
  index: number;
  year: string;
}

/** The January, first quarter or year ticks among `periods`, thinned so that the years' labels do not touch. */
export function yearTicks(periods: string[], step: number): YearTick[] {
  const ticks: YearTick[] = [];
  const room = textWidth('0000', labelSize) + 14;
  const first = periods[0];
  if (first === undefined) return ticks;
  const { frequency, index } = parsePeriod(first);
  const every =
    [1, 2, 5, 10, 20, 50].find((years) => years * PERIODS_A_YEAR[frequency] * step >= room) ?? 100;
  for (const [i, period] of periods.entries()) {
    const year = period.slice(0, 4);
    if (seasonOf(index + i, frequency) === 0 && Number(year) % every === 0) {
      ticks.push({ index: i, year });
    }
  }
  return ticks;
}

/** How many of the last periods a chart `width` px wide shows: whole years, with bars wide enough to tell apart. */
export function periodsShown(periods: string[], width: number): number {
  const last = periods.at(-1);
  if (last === undefined) return 0;
  const perYear = PERIODS_A_YEAR[parsePeriod(last).frequency];
  const fitting = Math.floor(width / 14.5);
  return Math.min(periods.length, Math.max(perYear, fitting - (fitting % perYear)));
}

/** "Sep 2029 to Aug 2031", or the one period. */
export function spanLabel(periods: string[]): string {
  const first = periods[0];
  const last = periods.at(-1);
  if (first === undefined || last === undefined) return 'no period';
  if (first === last) return periodLabel(first, 'short');
  return `${periodLabel(first, 'short')} to ${periodLabel(last, 'short')}`;
}
