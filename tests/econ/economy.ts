import type { ComputeRequest } from '../../src/lib/econ/types.ts';

/** Uniform numbers in (−½, ½) from a seed, by Lehmer's generator (Park & Miller 1988). */
export function uniforms(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48_271) % 2_147_483_647;
    return state / 2_147_483_647 - 0.5;
  };
}

/**
 * A request on a made-up monthly economy of the model: 300 months, output share 0.4, persistence 0.6, with a season in
 * money and prices. `changes` replace its parts.
 */
export function request(changes: Partial<ComputeRequest>, seed = 4711): ComputeRequest {
  const uniform = uniforms(seed);
  const money: number[] = [];
  const prices: number[] = [];
  const activity: number[] = [];
  let logMoney = 460;
  let growth = 0.4;
  let gap = 0;
  for (let t = 0; t < 300; t++) {
    const surprise = 2 * uniform();
    growth = 0.2 + 0.5 * growth + surprise;
    gap = 0.6 * gap + 0.4 * surprise + 0.1 * uniform();
    logMoney += growth + (t % 12 === 11 ? 1 : 0);
    money.push(Math.exp(logMoney / 100));
    prices.push(
      Math.exp((logMoney - gap - 0.1 * t + 0.1 * uniform() + (t % 12 === 5 ? 0.3 : 0)) / 100),
    );
    activity.push(Math.exp((450 + 0.15 * t + gap) / 100));
  }
  return {
    frequency: 'monthly',
    money: { start: '1995-01', values: money },
    prices: { start: '1995-01', values: prices },
    activity: { start: '1995-01', values: activity },
    expectation: {
      rule: 'autoregression',
      order: 1,
      seasonal: 'dummies',
      window: { kind: 'expanding', length: 60 },
    },
    slope: { method: 'fixed', b: 0.7, se_lambda: 0.05 },
    gap: { persistence: 0.6 },
    confidence: 0.8,
    ...changes,
  };
}
