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
  /** What the published figures have besides, where they are not seasonally adjusted. */
  seasons?: Seasons;
}

/** What each month of the year adds, January to December, in log points; each pattern sums to nothing. */
export interface Seasons {
  /** To money growth. */
  money: number[];
  /** To inflation. */
  prices: number[];
  /** To the level of activity. */
  activity: number[];
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
  /** Oldest first; the first holds from the first month of the demo on. */
  specifications: readonly DemoSpecification[];
  slot: DemoSlot;
}

/** A version of what the desk assumes about an economy. */
export interface DemoSpecification {
  /** For how many of the newest months it holds; without it, from the first month on. */
  newestMonths?: number;
  assumptions: Assumptions;
  /** Why the desk chose these assumptions; readers see it. */
  reason: string;
}

/** What the names and units of an economy's series are made from. */
interface Names {
  demonym: string;
  unit: string;
  moneyTiming?: Timing;
  adjustment?: DemoSeries['adjustment'];
}

/** The three series that every demo economy has, all invented and saying so. */
export function threeSeries(names: Names): DemoEconomy['series'] {
  const { demonym, unit, moneyTiming = 'average', adjustment = 'adjusted' } = names;
  const average = { timing: 'average', adjustment } as const;
  return {
    money: {
      title: 'Broad money',
      unit,
      timing: moneyTiming,
      adjustment,
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
