import { periodsFrom } from '../../src/lib/econ/periods.ts';
import type { Frequency, InflationResult } from '../../src/lib/econ/types.ts';
import { serverDocument } from '../../src/lib/charts/serverDocument.ts';
import { lightPalette } from '../../src/lib/charts/palette.ts';

/** Numbers in [−1, 1) that are the same at every run: a linear congruential generator (Numerical Recipes). */
export function generator(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 31 - 1;
  };
}

export interface SampleOptions {
  seed?: number;
  count?: number;
  frequency?: Frequency;
  /** Size of a typical surprise. */
  scale?: number;
}

/** An invented result, as far as the charts read it. */
export function sampleResult({
  seed = 1,
  count = 60,
  frequency = 'monthly',
  scale = 0.45,
}: SampleOptions = {}) {
  const next = generator(seed);
  const start = { monthly: '2026-09', quarterly: '2016-Q4', annual: '1971' }[frequency];
  const periods = periodsFrom(start, count, frequency);
  const surprise = periods.map(() => scale * (next() + next() + next()));
  const forecast_se = periods.map((_, i) => scale * (1 + 0.1 * Math.sin(i / 5)));
  let level = 0;
  const gap = surprise.map((u) => (level = 0.8 * level + 0.3 * u));
  const part = (size: number) => periods.map(() => size * next());
  const expected_money = periods.map(() => scale * 0.6 + scale * 0.2 * next());
  const current_surprise = surprise.map((u) => 0.6 * u);
  const carry_over = part(scale * 0.2);
  const unexplained = part(scale * 0.5);
  const actual = periods.map(
    (_, i) => expected_money[i]! + current_surprise[i]! + carry_over[i]! + unexplained[i]!,
  );
  const inflation: InflationResult = {
    actual,
    expected_money,
    current_surprise,
    carry_over,
    unexplained,
  };
  return {
    periods,
    surprise,
    forecast_se,
    standardised_surprise: surprise.map((u, i) => u / forecast_se[i]!),
    gap,
    gap_lower: gap.map((y) => y - 0.4 * scale),
    gap_upper: gap.map((y) => y + 0.5 * scale),
    inflation,
  };
}

export const drawing = {
  palette: lightPalette,
  idPrefix: 'test',
  document: serverDocument(),
};

export const widths = [350, 600, 720, 1248];
