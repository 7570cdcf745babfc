import type { Assumptions, Timing } from '../src/lib/econ/types.ts';

interface Money {
  /** μ: mean money growth, log points a month. */
  mean: number;
  /** φ: how growth leans on its own past, nearest month first. */
  phi: number[];
  /** σ: standard deviation of surprises. */
  sigma: number;
  /** g_V and the standard deviation of ν. */
  velocityGrowth: number;
  sdVelocity: number;
  /** g_y: trend growth of output. */
  outputGrowth: number;
}

/** An economy made from the model itself: what the product finds in it can be held against the truth. */
export interface ModelTruth extends Money {
  kind: 'model';
  /** λ: share of a nominal surprise that goes into output within the month. */
  lambda: number;
  /** ρ: how much of an output gap is left a month later. */
  rho: number;
  /** Standard deviation of ε, output's own surprises. */
  sdOutput: number;
  /** A break: what holds from a position on. */
  later?: { from: number; sigma: number; lambda: number };
}

/** An economy that rejects the model: its prices move a fixed part of the way to where money would have them. */
export interface StickyTruth extends Money {
  kind: 'sticky';
  priceDrift: number;
  adjustment: number;
  sdPrices: number;
}

/** How one series of the demo is described, and from which level it starts. */
export interface DemoSeries {
  title: string;
  unit: string;
  timing: Timing | null;
  adjustment: 'adjusted' | 'unadjusted';
  source: string;
}

/** When an economy's figures come out: days from the day of seeding for the newest month, and the hour (UTC). */
export interface DemoSlot {
  day: number;
  hour: number;
  minute: number;
  /** The newest month is due this many minutes after seeding instead. */
  minutesAfterSeeding?: number;
}

/** One invented economy: what is true of it, what the desk assumes and how it is described. */
export interface DemoEconomy {
  code: string;
  name: string;
  /** The name inside a sentence, with its article where it has one. */
  nameInText: string;
  currency: string;
  /** Of its random numbers; chosen among two dozen so that gaps stay in range and newest months differ. */
  seed: number;
  truth: ModelTruth | StickyTruth;
  /** Money in the first month, in the unit of the series. */
  firstMoney: number;
  /** Prices carry another base year from this position's vintage on. */
  pricesRebasedFrom?: number;
  series: { money: DemoSeries; prices: DemoSeries; activity: DemoSeries };
  assumptions: Assumptions;
  /** Why the desk chose these assumptions. */
  reason: string;
  slot: DemoSlot;
}

interface Names {
  demonym: string;
  unit: string;
  moneyTiming?: Timing;
}

/** The three series that every demo economy has, all invented and saying so. */
function threeSeries({ demonym, unit, moneyTiming = 'average' }: Names): DemoEconomy['series'] {
  const average = { timing: 'average', adjustment: 'adjusted' } as const;
  return {
    money: {
      title: 'Broad money',
      unit,
      timing: moneyTiming,
      adjustment: 'adjusted',
      source: `${demonym} monetary survey (invented)`,
    },
    prices: {
      title: 'Consumer prices',
      unit: 'index points',
      ...average,
      source: `${demonym} consumer price index (invented)`,
    },
    activity: {
      title: 'Activity',
      unit: 'index points',
      ...average,
      source: `${demonym} monthly activity index (invented)`,
    },
  };
}

/** The output share as the slope b the computation takes: λ = b/(1+b). */
function slopeOf(lambda: number): number {
  return lambda / (1 - lambda);
}

const aldermark: DemoEconomy = {
  code: 'XAL',
  name: 'Aldermark',
  nameInText: 'Aldermark',
  currency: 'alder',
  seed: 6,
  truth: {
    kind: 'model',
    mean: 0.5,
    phi: [0.45],
    sigma: 0.3,
    lambda: 0.362,
    rho: 0.93,
    outputGrowth: 0.18,
    velocityGrowth: -0.07,
    sdVelocity: 0.15,
    sdOutput: 0.2,
  },
  firstMoney: 410,
  pricesRebasedFrom: 358,
  series: threeSeries({ demonym: 'Aldermark', unit: 'billion alders' }),
  assumptions: {
    expectation: {
      rule: 'autoregression',
      order: 1,
      seasonal: 'none',
      window: { kind: 'expanding', length: 120 },
    },
    slope: { method: 'prices' },
    gap: { persistence: 0.93 },
    confidence: 0.8,
  },
  reason:
    'First version. One lag describes money growth here; the output share is estimated from prices over all months; persistence is set at 0.93.',
  slot: { day: -9, hour: 8, minute: 0 },
};

const brannochIsles: DemoEconomy = {
  code: 'XBR',
  name: 'Brannoch Isles',
  nameInText: 'the Brannoch Isles',
  currency: 'brann',
  seed: 16,
  truth: {
    kind: 'model',
    mean: 0.32,
    phi: [0.3],
    sigma: 0.15,
    lambda: 0.599,
    rho: 0.95,
    outputGrowth: 0.14,
    velocityGrowth: -0.08,
    sdVelocity: 0.07,
    sdOutput: 0.15,
  },
  firstMoney: 64,
  series: threeSeries({ demonym: 'Brannoch', unit: 'billion branns', moneyTiming: 'end' }),
  assumptions: {
    expectation: {
      rule: 'autoregression',
      order: 1,
      seasonal: 'none',
      window: { kind: 'rolling', length: 180 },
    },
    slope: { method: 'fixed', b: slopeOf(0.6), se_lambda: 0.06 },
    gap: { persistence: 0.95 },
    confidence: 0.8,
  },
  reason:
    'First version. Money is an end-of-month figure and prices are averages, so an output share estimated from prices would be too large: 0.60 with a standard error of 0.06 is assumed instead. The expectation learns from the last fifteen years; persistence is set at 0.95.',
  slot: { day: -6, hour: 9, minute: 30 },
};

const costaLirra: DemoEconomy = {
  code: 'XCL',
  name: 'Costa Lirra',
  nameInText: 'Costa Lirra',
  currency: 'lirran',
  seed: 8,
  truth: {
    kind: 'model',
    mean: 0.6,
    phi: [0.5],
    sigma: 0.16,
    lambda: 0.589,
    rho: 0.9,
    outputGrowth: 0.2,
    velocityGrowth: 0,
    sdVelocity: 0.08,
    sdOutput: 0.12,
    later: { from: 216, sigma: 0.48, lambda: 0.156 },
  },
  firstMoney: 88,
  series: threeSeries({ demonym: 'Costa Lirra', unit: 'billion lirrans' }),
  assumptions: {
    expectation: {
      rule: 'autoregression',
      order: 2,
      seasonal: 'none',
      window: { kind: 'rolling', length: 120 },
    },
    slope: { method: 'prices', window: { length: 120 } },
    gap: { persistence: 0.9 },
    confidence: 0.8,
  },
  reason:
    'First version. Money has been less steady for some years, and the output share with it: both the expectation and the output share look back ten years and no further. Persistence is set at 0.90.',
  slot: { day: -3, hour: 10, minute: 0 },
};

const dunmere: DemoEconomy = {
  code: 'XDU',
  name: 'Dunmere',
  nameInText: 'Dunmere',
  currency: 'dunar',
  seed: 11,
  truth: {
    kind: 'model',
    mean: 2.4,
    phi: [0.5, 0.2],
    sigma: 0.7,
    lambda: 0.074,
    rho: 0.85,
    outputGrowth: 0.17,
    velocityGrowth: 0.05,
    sdVelocity: 0.2,
    sdOutput: 0.2,
  },
  firstMoney: 24,
  series: threeSeries({ demonym: 'Dunmere', unit: 'billion dunars' }),
  assumptions: {
    expectation: {
      rule: 'autoregression',
      order: 2,
      seasonal: 'none',
      window: { kind: 'expanding', length: 120 },
    },
    slope: { method: 'fixed', b: slopeOf(0.08), se_lambda: 0.03 },
    gap: { persistence: 0.85 },
    confidence: 0.8,
  },
  reason:
    'First version. Where prices rise this fast, surprises reach them almost at once: an output share of 0.08 with a standard error of 0.03 is assumed, and a persistence of 0.85.',
  slot: { day: 10, hour: 7, minute: 0 },
};

const estavel: DemoEconomy = {
  code: 'XES',
  name: 'Estavel',
  nameInText: 'Estavel',
  currency: 'estave',
  seed: 20,
  truth: {
    kind: 'sticky',
    mean: 0.55,
    phi: [0.55],
    sigma: 0.32,
    outputGrowth: 0.18,
    velocityGrowth: -0.07,
    sdVelocity: 0.12,
    priceDrift: 0.3,
    adjustment: 0.06,
    sdPrices: 0.15,
  },
  firstMoney: 210,
  series: threeSeries({ demonym: 'Estavel', unit: 'billion estaves' }),
  assumptions: {
    expectation: {
      rule: 'autoregression',
      order: 1,
      seasonal: 'none',
      window: { kind: 'expanding', length: 120 },
    },
    slope: { method: 'prices' },
    gap: { persistence: 0.9 },
    confidence: 0.8,
  },
  reason:
    'First version. The same rule as for Aldermark; prices hardly answer to money within the month, and the neutrality test says so on every release. Persistence is set at 0.90.',
  slot: { day: 0, hour: 9, minute: 0, minutesAfterSeeding: 15 },
};

/** The economies of the demo, in the order of their codes. */
export const demoEconomies: readonly DemoEconomy[] = [
  aldermark,
  brannochIsles,
  costaLirra,
  dunmere,
  estavel,
];
