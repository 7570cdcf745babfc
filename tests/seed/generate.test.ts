import { describe, expect, test } from 'vitest';
import { demoEconomies } from '../../seed/economies.ts';
import type { DemoEconomy } from '../../seed/economy.ts';
import { generate, HISTORY_MONTHS, regimeAt } from '../../seed/generate.ts';
import { leastSquares } from './leastSquares.ts';

/** How many standard errors an estimate may lie from its truth; some fifty estimates are compared. */
const ERRORS = 3.2;

const economy = (code: string) => demoEconomies.find((candidate) => candidate.code === code)!;
const changes = (levels: number[]) => levels.slice(1).map((level, i) => level - levels[i]!);

/** Positions of one regime, from the third on so that every lag exists. */
function regimes({ truth }: DemoEconomy): number[][] {
  const breaks = truth.kind === 'model' && truth.later ? [truth.later.from] : [];
  const ends = [3, ...breaks, HISTORY_MONTHS];
  return ends
    .slice(1)
    .map((end, i) => Array.from({ length: end - ends[i]! }, (_, n) => ends[i]! + n));
}

describe.each(demoEconomies)('the history of $name', (demo) => {
  const history = generate(demo);
  const growth = [NaN, ...changes(history.money)];
  const velocity = history.prices.map(
    (prices, t) => prices + history.activity[t]! - history.money[t]!,
  );

  test('depends on the seed and the position alone', () => {
    expect(generate(demo)).toEqual(history);
    expect(generate({ ...demo, seed: demo.seed + 1 }).money).not.toEqual(history.money);
    expect(history.money).toHaveLength(360);
    expect(history.firstError).toHaveLength(360);
  });

  test('holds money growth with its true mean, lags and variance', () => {
    const { phi, mean } = demo.truth;
    for (const positions of regimes(demo)) {
      const rows = positions.map((t) => [1, ...phi.map((_, lag) => growth[t - 1 - lag]!)]);
      const fit = leastSquares(
        rows,
        positions.map((t) => growth[t]!),
      );
      const truths = [mean * (1 - phi.reduce((sum, value) => sum + value, 0)), ...phi];
      truths.forEach((truth, i) => near(fit.coefficients[i]!, truth, fit.errors[i]!));
      const { sigma } = regimeAt(demo.truth, positions[0]!);
      near(fit.sd, sigma, sigma / Math.sqrt(2 * positions.length));
    }
  });

  test('holds velocity with its true drift and variance', () => {
    const steps = changes(velocity);
    const mean = steps.reduce((sum, step) => sum + step, 0) / steps.length;
    const sd = Math.sqrt(
      steps.reduce((sum, step) => sum + (step - mean) ** 2, 0) / (steps.length - 1),
    );
    const { velocityGrowth, sdVelocity } = demo.truth;
    near(mean, velocityGrowth, sd / Math.sqrt(steps.length));
    near(sd, sdVelocity, sdVelocity / Math.sqrt(2 * steps.length));
  });

  test('moves output, or prices, as its truth says', () => {
    for (const positions of regimes(demo)) {
      const { truth } = demo;
      if (truth.kind === 'model') {
        const nominal = (t: number) =>
          history.surprise[t]! + velocity[t]! - velocity[t - 1]! - truth.velocityGrowth;
        const fit = leastSquares(
          positions.map((t) => [history.gap[t - 1]!, nominal(t)]),
          positions.map((t) => history.gap[t]!),
        );
        near(fit.coefficients[0]!, truth.rho, fit.errors[0]!);
        near(fit.coefficients[1]!, regimeAt(truth, positions[0]!).lambda!, fit.errors[1]!);
        near(fit.sd, truth.sdOutput, truth.sdOutput / Math.sqrt(2 * positions.length));
      } else {
        const flexible = (t: number) => history.prices[t]! + history.gap[t]!;
        const fit = leastSquares(
          positions.map((t) => [1, flexible(t) - history.prices[t - 1]! - truth.priceDrift]),
          positions.map((t) => history.prices[t]! - history.prices[t - 1]!),
        );
        near(fit.coefficients[0]!, truth.priceDrift, fit.errors[0]!);
        near(fit.coefficients[1]!, truth.adjustment, fit.errors[1]!);
        near(fit.sd, truth.sdPrices, truth.sdPrices / Math.sqrt(2 * positions.length));
      }
    }
  });

  test('lets nothing but trend, gap and velocity stand between money and prices', () => {
    history.activity.forEach((activity, t) => {
      expect(activity).toBeCloseTo(demo.truth.outputGrowth * t + history.gap[t]!, 9);
    });
  });

  test('keeps output within six per cent of trend', () => {
    expect(Math.max(...history.gap.map(Math.abs))).toBeLessThan(6);
  });

  test('errs in first figures by 0.4 of a surprise', () => {
    for (const positions of regimes(demo)) {
      const sigma = 0.4 * regimeAt(demo.truth, positions[0]!).sigma;
      const squares = positions.reduce((sum, t) => sum + history.firstError[t]! ** 2, 0);
      near(Math.sqrt(squares / positions.length), sigma, sigma / Math.sqrt(2 * positions.length));
    }
  });
});

test('no two economies share their random numbers', () => {
  const shocks = demoEconomies.map(
    (demo) => generate(demo).surprise[0]! / regimeAt(demo.truth, 0).sigma,
  );
  expect(new Set(shocks.map((shock) => shock.toFixed(6))).size).toBe(demoEconomies.length);
});

test('Costa Lirra is another economy from its break on', () => {
  const { truth } = economy('XCL');
  expect(regimeAt(truth, 215)).toMatchObject({ sigma: 0.16, lambda: 0.589 });
  expect(regimeAt(truth, 216)).toMatchObject({ sigma: 0.48, lambda: 0.156 });
});

function near(estimate: number, truth: number, error: number): void {
  expect(Math.abs(estimate - truth) / error).toBeLessThan(ERRORS);
}
