import { describe, expect, test } from 'vitest';
import { demoEconomies } from '../../seed/economies.ts';
import type { DemoEconomy, ModelTruth } from '../../seed/economy.ts';
import { HISTORY_MONTHS } from '../../seed/generate.ts';
import { demoData } from '../../seed/vintages.ts';
import { compute } from '../../src/lib/econ/compute.ts';
import type { Assumptions, ComputeResult, Timing } from '../../src/lib/econ/types.ts';

const START = '2001-09';
const NEWEST = HISTORY_MONTHS - 1;

/** The two dozen seeds that the demo's own were chosen from, so that the count is not of chosen ones. */
const SEEDS = Array.from({ length: 24 }, (_, i) => i + 1);

/** Standard errors within which an estimate counts as found, and how often it must be: demo.md's own words. */
const ERRORS = 2;
const LEAST_SHARE = 0.9;

/** The same where each of two dozen estimates must be found. */
const MANY_ERRORS = 3.2;

const economy = (code: string) => demoEconomies.find((candidate) => candidate.code === code)!;

function computed(demo: DemoEconomy, assumptions?: Assumptions, start = START): ComputeResult {
  const vintage = demoData(demo, start).vintage(NEWEST);
  const series = (name: 'money' | 'prices' | 'activity') => ({
    start,
    values: vintage[name].map(Number),
    timing: demo.series[name].timing as Timing,
  });
  return compute({
    frequency: 'monthly',
    money: series('money'),
    prices: series('prices'),
    activity: series('activity'),
    ...(assumptions ?? inForce(demo)),
  });
}

const inForce = ({ specifications }: DemoEconomy) => specifications.at(-1)!.assumptions;

/** How many standard errors the estimates lie from what is true at the end of the history. */
function deviations(demo: DemoEconomy): number[] {
  const { slope } = computed(demo);
  const { lambda, later, rho } = demo.truth as ModelTruth;
  return [
    (slope.lambda - (later?.lambda ?? lambda)) / slope.se_lambda!,
    (slope.rho! - rho) / slope.se_rho!,
  ];
}

describe('the specifications in force', () => {
  const newest = Object.fromEntries(demoEconomies.map((demo) => [demo.code, inForce(demo)]));

  test('are those of the demo', () => {
    const rule = ({ expectation }: Assumptions) =>
      expectation.rule === 'autoregression' && [
        expectation.order,
        expectation.seasonal,
        expectation.window,
      ];
    const expanding = { kind: 'expanding', length: 120 };
    expect(rule(newest.XAL!)).toEqual([{ criterion: 'bic', max: 6 }, 'none', expanding]);
    expect(rule(newest.XBR!)).toEqual([1, 'none', { kind: 'rolling', length: 180 }]);
    expect(rule(newest.XCL!)).toEqual([2, 'none', { kind: 'rolling', length: 120 }]);
    expect(rule(newest.XDU!)).toEqual([2, 'none', expanding]);
    expect(rule(newest.XES!)).toEqual([1, 'none', expanding]);
    expect(rule(newest.XFA!)).toEqual([1, 'dummies', expanding]);
    const slopes = Object.fromEntries(
      Object.entries(newest).map(([code, { slope }]) => [code, slope]),
    );
    expect(slopes).toMatchObject({
      XAL: { method: 'prices' },
      XBR: { method: 'activity' },
      XCL: { method: 'prices', window: { length: 120 } },
      XDU: { method: 'fixed', se_lambda: 0.03 },
      XES: { method: 'prices' },
      XFA: { method: 'prices' },
    });
    for (const [code, { gap }] of Object.entries(newest)) {
      expect(gap, code).toEqual({ persistence: code === 'XDU' ? 0.85 : 'estimated' });
    }
    expect(computed(economy('XDU')).slope.lambda).toBeCloseTo(0.08, 12);
  });

  test('have a reason each, that no other version gives', () => {
    const versions = demoEconomies.flatMap(({ specifications }) => specifications);
    expect(new Set(versions.map(({ reason }) => reason)).size).toBe(versions.length);
    for (const { reason } of versions) expect(reason).toMatch(/^[A-Z].*\.$/);
    for (const { specifications } of demoEconomies) {
      expect(specifications.map(({ newestMonths }) => newestMonths)).toEqual(
        [undefined, 2].slice(0, specifications.length),
      );
    }
  });
});

describe('what the product finds in the demo', () => {
  const estimated = ['XAL', 'XBR', 'XCL', 'XFA'];

  test('is the truth, within two standard errors in nine cases of ten', () => {
    const cases = estimated.flatMap((code) =>
      SEEDS.flatMap((seed) => deviations({ ...economy(code), seed })),
    );
    const found = cases.filter((deviation) => Math.abs(deviation) <= ERRORS);
    expect(found.length / cases.length).toBeGreaterThanOrEqual(LEAST_SHARE);
  });

  test.each(estimated)('is the truth of %s in the history that is published', (code) => {
    for (const deviation of deviations(economy(code))) {
      expect(Math.abs(deviation)).toBeLessThanOrEqual(ERRORS);
    }
  });

  test('holds what is assumed of Dunmere against its truth', () => {
    const { slope } = computed(economy('XDU'));
    const { lambda, rho } = economy('XDU').truth as ModelTruth;
    expect(Math.abs(slope.lambda - lambda)).toBeLessThanOrEqual(ERRORS * slope.se_lambda!);
    expect(inForce(economy('XDU')).gap!.persistence).toBe(rho);
  });

  test('rejects Estavel far beyond 1%, where prices show no response, and nobody else', () => {
    for (const demo of demoEconomies) {
      for (const { assumptions } of demo.specifications) {
        const { diagnostics, slope } = computed(demo, assumptions);
        const { p } = diagnostics.neutrality!;
        expect(slope.within_model, demo.code).toBe(true);
        if (demo.code === 'XES') {
          expect(p).toBeLessThan(1e-6);
          expect(Math.abs(slope.no_response!.t)).toBeLessThan(2);
        } else {
          expect(p, demo.code).toBeGreaterThanOrEqual(0.01);
        }
      }
    }
  });

  test('has gaps in a range that a newsroom would print', () => {
    for (const demo of demoEconomies) {
      for (const { assumptions } of demo.specifications) {
        const gaps = computed(demo, assumptions).gap!.filter((gap) => gap !== null);
        expect(Math.max(...gaps.map(Math.abs)), demo.code).toBeLessThan(
          demo.code === 'XES' ? 3 : 1,
        );
      }
    }
  });

  test('warns of the timing of money and prices on the Brannoch Isles alone', () => {
    for (const demo of demoEconomies) {
      const warned = computed(demo).warnings.some((warning) =>
        warning.startsWith('Money and prices are dated differently'),
      );
      expect(warned, demo.code).toBe(demo.code === 'XBR');
    }
  });
});

describe('the seasons of Farrowland', () => {
  const farrowland = economy('XFA');
  const { seasons, phi, mean, sigma } = farrowland.truth as ModelTruth;
  const monthOf = (period: string) => Number(period.slice(5)) - 1;
  const result = computed(farrowland);

  test('are found back in the expectations of the last twelve months', () => {
    const usual = (i: number) => mean + seasons!.money[monthOf(result.periods[i]!)]!;
    const last = result.periods.length - 1;
    for (let i = last - 11; i <= last; i++) {
      const truth = usual(i) + phi[0]! * (result.growth[i - 1]! - usual(i - 1));
      const error = Math.sqrt(result.parameter_variance[i]!);
      near(result.expected_growth[i]!, truth, error);
    }
  });

  test('are found back in what money less prices usually does', () => {
    const { expected_money, unexplained } = result.inflation!;
    const shown = result.periods.flatMap((_, i) => (unexplained[i] === null ? [] : [i]));
    const usual = seasons!.money.map((_, month) => {
      const i = shown.findLast((at) => monthOf(result.periods[at]!) === month)!;
      return result.growth[i]! - result.surprise[i]! - expected_money[i]!;
    });
    const average = usual.reduce((sum, value) => sum + value, 0) / 12;
    const squares = shown.reduce((sum, i) => sum + unexplained[i]! ** 2, 0);
    const error = Math.sqrt(squares / (shown.length - 12) / Math.floor(shown.length / 12));
    usual.forEach((value, month) => {
      near(value - average, seasons!.money[month]! - seasons!.prices[month]!, error);
    });
  });

  test('leave nothing in the surprises, and much without indicators', () => {
    const { expectation, ...rest } = inForce(farrowland);
    const blind = { ...expectation, seasonal: 'none' } as Assumptions['expectation'];
    const size = ({ diagnostics }: ComputeResult) => diagnostics.surprise!.sd!;
    near(size(result), sigma, sigma / Math.sqrt(2 * result.surprise.length));
    expect(size(computed(farrowland, { ...rest, expectation: blind }))).toBeGreaterThan(
      1.5 * sigma,
    );
  });

  test('make no difference to what is found, whichever month the history begins with', () => {
    for (const start of ['2001-10', '2002-03']) {
      const other = computed(farrowland, undefined, start);
      expect(other.surprise.at(-1)).toBeCloseTo(result.surprise.at(-1)!, 1);
      expect(other.slope.lambda).toBeCloseTo(result.slope.lambda, 1);
      expect(other.diagnostics.neutrality!.p).toBeGreaterThanOrEqual(0.01);
    }
  });
});

function near(estimate: number, truth: number, error: number): void {
  expect(Math.abs(estimate - truth) / error).toBeLessThan(MANY_ERRORS);
}
