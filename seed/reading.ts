import { type Side, side } from '../src/lib/charts/figures.ts';
import { facts } from '../src/lib/econ/facts.ts';
import { periodDifference } from '../src/lib/econ/periods.ts';
import type { ComputeResult } from '../src/lib/econ/types.ts';

/** Below this |t| prices show no detectable response. */
const NO_RESPONSE_T = 2;

/** What the words of a release are made from: the last month of a computed result, in log points. */
export interface Reading {
  growth: number;
  expected: number;
  surprise: number;
  side: Side;
  standardised: number | null;
  cumulated: number | null;
  /** Months up to this one in a row on its side of the datum, level ones breaking the row. */
  monthsOnSide: number;
  /** The last earlier month with a surprise at least as large on the same side, or the first month; null if level. */
  largestSince: { period: string; isFirst: boolean; months: number } | null;
  gap: { value: number; lower: number | null; upper: number | null } | null;
  pricesIgnoreMoney: boolean;
  inflation: {
    actual: number;
    expectedMoney: number;
    currentSurprise: number;
    unexplained: number;
  } | null;
}

/** Reads the last month of a result. */
export function readLastMonth(result: ComputeResult): Reading {
  const last = result.periods.length - 1;
  const surprise = result.surprise[last]!;
  const here = side(surprise);
  const gap = result.gap?.[last] ?? null;
  const { no_response } = result.slope;
  return {
    growth: result.growth[last]!,
    expected: result.expected_growth[last]!,
    surprise,
    side: here,
    standardised: result.standardised_surprise[last] ?? null,
    cumulated: result.cumulated_surprise[last] ?? null,
    monthsOnSide: runLength(result.surprise, here),
    largestSince: here === 'level' ? null : largestSince(result),
    gap:
      gap === null
        ? null
        : {
            value: gap,
            lower: result.gap_lower?.[last] ?? null,
            upper: result.gap_upper?.[last] ?? null,
          },
    pricesIgnoreMoney: no_response !== null && Math.abs(no_response.t) < NO_RESPONSE_T,
    inflation: partsOfInflation(result.inflation, last),
  };
}

function largestSince(result: ComputeResult): Reading['largestSince'] {
  const { period, surprise } = facts(result);
  if (!surprise.largest_since) return null;
  const { period: larger, from } = surprise.largest_since;
  const since = larger ?? from;
  return { period: since, isFirst: larger === null, months: periodDifference(since, period) };
}

function partsOfInflation(
  inflation: ComputeResult['inflation'],
  last: number,
): Reading['inflation'] {
  const actual = inflation?.actual[last] ?? null;
  const expectedMoney = inflation?.expected_money[last] ?? null;
  const currentSurprise = inflation?.current_surprise[last] ?? null;
  const unexplained = inflation?.unexplained[last] ?? null;
  if (actual === null || expectedMoney === null) return null;
  if (currentSurprise === null || unexplained === null) return null;
  return { actual, expectedMoney, currentSurprise, unexplained };
}

function runLength(surprises: number[], here: Side): number {
  let length = 0;
  while (length < surprises.length && side(surprises.at(-1 - length)!) === here) length++;
  return length;
}
