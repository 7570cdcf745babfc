import { describe, expect, test } from 'vitest';
import { compute } from '../../src/lib/econ/compute.ts';
import type { ComputeRequest, Expectation } from '../../src/lib/econ/types.ts';

/** Runs only where TEST_LONG is set (`npm run test:long`): some minutes. */
const LONG = process.env.TEST_LONG !== undefined;
const ECONOMIES = Number(process.env.TEST_LONG_ECONOMIES ?? 1000);
const MONTHS = 360;
const BURN_IN = 240;

/** z of a central 80% interval. */
const Z80 = 1.2815515655446004;

interface Truth {
  phi: number[];
  lambda: number;
  rho: number;
  seasonal: boolean;
  /** Share of the distance to its equilibrium that a sticky price level makes good in a month; null for the model's prices. */
  sticky: number | null;
}

const SEASON = [-1.6, -0.4, 0.3, 0.1, -0.2, 0.4, 0.3, -0.5, -0.1, 0, 0.3, 1.4];

/** Standard normal numbers (Box & Muller 1958) from a generator whose neighbouring seeds are unrelated (Mulberry32). */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return (((mixed ^ (mixed >>> 14)) >>> 0) + 0.5) / 4_294_967_296;
  };
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}

/** An economy of the model with velocity and noise of its own, as in the demo; `gap` is what surprises made of output. */
function economy(truth: Truth, seed: number) {
  const normal = normals(seed);
  const { phi, lambda, rho } = truth;
  const intercept = 0.5 * (1 - phi.reduce((sum, one) => sum + one, 0));
  const past = phi.map(() => 0.5);
  let logMoney = 0;
  let velocity = 0;
  let output = 0;
  let gap = 0;
  let price = 0;
  const levels = { money: [] as number[], prices: [] as number[], activity: [] as number[] };
  for (let t = 0; t < BURN_IN + MONTHS; t++) {
    const surprise = 0.3 * normal();
    const demand = 0.15 * normal();
    const core = intercept + phi.reduce((sum, one, j) => sum + one * past[j]!, 0) + surprise;
    past.unshift(core);
    past.pop();
    logMoney += core + (truth.seasonal ? SEASON[t % 12]! : 0);
    velocity += -0.07 + demand;
    const noise = 0.2 * normal();
    gap = rho * gap + lambda * surprise;
    const equilibrium = logMoney + velocity - 0.18 * t;
    if (truth.sticky === null) {
      output = rho * output + lambda * (surprise + demand) + noise;
      price = equilibrium - output;
    } else {
      price += 0.3 + truth.sticky * (equilibrium - price - 0.3) + noise;
      output = equilibrium - price;
    }
    if (t < BURN_IN) continue;
    levels.money.push(Math.exp(logMoney / 100));
    levels.prices.push(Math.exp(price / 100));
    levels.activity.push(Math.exp((0.18 * t + output) / 100));
  }
  return { levels, gap };
}

function requestOf(
  levels: ReturnType<typeof economy>['levels'],
  expectation: Expectation,
): ComputeRequest {
  const series = (values: number[]) => ({ start: '2001-01', values });
  return {
    frequency: 'monthly',
    money: series(levels.money),
    prices: series(levels.prices),
    activity: series(levels.activity),
    expectation,
    slope: { method: 'prices' },
    gap: { persistence: 'estimated' },
    confidence: 0.8,
  };
}

const expanding = { kind: 'expanding', length: 120 } as const;
const model: Truth = { phi: [0.45], lambda: 0.362, rho: 0.93, seasonal: false, sticky: null };

const plain: [string, number[], Expectation][] = [
  ['random walk', [], { rule: 'random_walk', window: expanding }],
  ['AR(1)', [0.45], { rule: 'autoregression', order: 1, window: expanding }],
  ['AR(4)', [0.3, 0.1, 0.1, 0.1], { rule: 'autoregression', order: 4, window: expanding }],
];

const rules: [string, Truth, Expectation][] = [false, true].flatMap((seasonal) =>
  plain.map(([name, phi, expectation]): [string, Truth, Expectation] => [
    seasonal ? `${name} with indicators` : name,
    { ...model, phi, seasonal },
    { ...expectation, seasonal: seasonal ? 'dummies' : 'none' } as Expectation,
  ]),
);

/**
 * Persistence of the economy, how it is known, and between which shares the gap's band must cover. Estimated near one
 * beside a trend it is biased down (method, section 3), 0.915 for 0.93 here, and the band does not hold that bias.
 */
const persistences: [number, 'given' | 'estimated', number, number][] = [
  [0.6, 'estimated', 0.73, 0.86],
  [0.93, 'given', 0.73, 0.86],
  [0.93, 'estimated', 0.68, 0.86],
];

const cases = rules.flatMap(([name, truth, expectation]) =>
  persistences.map(
    ([rho, known, least, most]) =>
      [
        `${name}, persistence ${rho} ${known}`,
        { ...truth, rho },
        expectation,
        known,
        least,
        most,
      ] as const,
  ),
);

describe.runIf(LONG)(`over ${ECONOMIES} economies of the model`, { timeout: 1_800_000 }, () => {
  test.each(cases)(
    '%s: the 80% intervals of λ and of the gap cover, and neutrality keeps its size',
    (name, truth, expectation, known, least, most) => {
      let lambdaCovered = 0;
      let gapCovered = 0;
      let gaps = 0;
      let rejected = 0;
      for (let seed = 1; seed <= ECONOMIES; seed++) {
        const { levels, gap } = economy(truth, 7_919 * seed);
        const persistence = known === 'given' ? truth.rho : known;
        const result = compute({ ...requestOf(levels, expectation), gap: { persistence } });
        const { lambda, se_lambda: error } = result.slope;
        if (Math.abs(lambda - truth.lambda) <= Z80 * error!) lambdaCovered++;
        if (result.diagnostics.neutrality!.p! < 0.01) rejected++;
        if (result.gap_lower === null) continue;
        gaps++;
        const last = result.periods.length - 1;
        if (result.gap_lower[last]! <= gap && gap <= result.gap_upper![last]!) gapCovered++;
      }
      const percent = (share: number) => `${(100 * share).toFixed(1)}%`;
      console.log(
        `${name}: λ ${percent(lambdaCovered / ECONOMIES)}, gap ${percent(gapCovered / gaps)} of ${gaps}, neutrality rejected ${percent(rejected / ECONOMIES)}`,
      );
      expect(lambdaCovered / ECONOMIES).toBeGreaterThanOrEqual(0.75);
      expect(lambdaCovered / ECONOMIES).toBeLessThanOrEqual(0.83);
      expect(gapCovered / gaps).toBeGreaterThanOrEqual(least);
      expect(gapCovered / gaps).toBeLessThanOrEqual(most);
      if (name.startsWith('AR(1)')) expect(rejected / ECONOMIES).toBeLessThan(0.03);
    },
  );

  test('sticky prices are rejected by an autoregression', () => {
    let rejected = 0;
    for (let seed = 1; seed <= ECONOMIES; seed++) {
      const { levels } = economy({ ...model, phi: [0.55], sticky: 0.06 }, 104_729 * seed);
      const expectation: Expectation = { rule: 'autoregression', order: 1, window: expanding };
      const p = compute(requestOf(levels, expectation)).diagnostics.neutrality?.p ?? 1;
      if (p < 0.01) rejected++;
    }
    console.log(`sticky prices: neutrality rejected ${(100 * rejected) / ECONOMIES}%`);
    expect(rejected / ECONOMIES).toBeGreaterThan(0.95);
  });
});
