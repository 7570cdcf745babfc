import { type Side, side } from '../src/lib/charts/figures.ts';
import type { ComputeResult } from '../src/lib/econ/types.ts';

/** Neutrality rejected below this: the gap is then an assumption. */
const REJECTED_BELOW = 0.01;

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
  /** Months up to this one in a row on its side of the datum. */
  monthsOnSide: number;
  /** The last earlier month with a surprise at least as large on the same side; null where there is none. */
  largestSince: string | null;
  /** How many months lie between that month and this one; between the first and this one where there is none. */
  monthsSince: number;
  firstPeriod: string;
  gap: { value: number; lower: number | null; upper: number | null } | null;
  /** The model's own test fails, so the gap is an assumption. */
  gated: boolean;
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
  const { slope, diagnostics, inflation } = result;
  const larger = lastLarger(result.surprise, here);
  const gap = result.gap?.[last] ?? null;
  const p = diagnostics.neutrality?.p ?? null;
  return {
    growth: result.growth[last]!,
    expected: result.expected_growth[last]!,
    surprise,
    side: here,
    standardised: result.standardised_surprise[last] ?? null,
    cumulated: result.cumulated_surprise[last] ?? null,
    monthsOnSide: runLength(result.surprise, here),
    largestSince: larger === null ? null : result.periods[larger]!,
    monthsSince: last - (larger ?? 0),
    firstPeriod: result.periods[0]!,
    gap:
      gap === null
        ? null
        : {
            value: gap,
            lower: result.gap_lower?.[last] ?? null,
            upper: result.gap_upper?.[last] ?? null,
          },
    gated: p !== null && p < REJECTED_BELOW,
    pricesIgnoreMoney: slope.no_response !== null && Math.abs(slope.no_response.t) < NO_RESPONSE_T,
    inflation: partsOfInflation(inflation, last),
  };
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

function lastLarger(surprises: number[], here: Side): number | null {
  const size = Math.abs(surprises.at(-1)!);
  for (let i = surprises.length - 2; i >= 0; i--) {
    if (side(surprises[i]!) === here && Math.abs(surprises[i]!) >= size) return i;
  }
  return null;
}
