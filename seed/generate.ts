import type { DemoEconomy, ModelTruth, StickyTruth } from './economy.ts';
import { type RandomStream, randomStream } from './random.ts';

/** Months of every demo history: thirty years. */
export const HISTORY_MONTHS = 360;

/** Months run before the history, so that it does not remember where it was started. */
const BURN_IN = 240;

/** How far off the first figure for a month's money is, in standard deviations of its surprise. */
const FIRST_ERROR = 0.4;

/** The true history of an economy, in log points, by position 0 … 359. */
export interface TrueHistory {
  money: number[];
  prices: number[];
  activity: number[];
  /** u_t: what the month's money growth really held that nobody could expect. */
  surprise: number[];
  /** y_t: output's true distance from trend. */
  gap: number[];
  /** Error of the first published figure for the month's money. */
  firstError: number[];
}

/** The generator of the demo: 360 months that depend on the economy's truth and seed alone, without seasons. */
export function generate(economy: DemoEconomy): TrueHistory {
  const stream = randomStream(economy.seed);
  const history =
    economy.truth.kind === 'model'
      ? fromModel(economy.truth, stream)
      : withStickyPrices(economy.truth, stream);
  // Drawn after the history, so that a look at revisions leaves the truth where it was.
  for (let position = 0; position < HISTORY_MONTHS; position++) {
    history.firstError.push(stream.normal(FIRST_ERROR * regimeAt(economy.truth, position).sigma));
  }
  return history;
}

/** The standard deviation of surprises and the output share that hold at a position. */
export function regimeAt(
  truth: ModelTruth | StickyTruth,
  position: number,
): { sigma: number; lambda: number | null } {
  if (truth.kind === 'sticky') return { sigma: truth.sigma, lambda: null };
  if (truth.later && position >= truth.later.from) return truth.later;
  return { sigma: truth.sigma, lambda: truth.lambda };
}

/** Nominal demand surprises move output, the rest of money goes into prices. */
function fromModel(truth: ModelTruth, stream: RandomStream): TrueHistory {
  const history = emptyHistory();
  const growth = moneyGrowth(truth);
  let [money, velocity, gap] = [0, 0, 0];
  for (let position = -BURN_IN; position < HISTORY_MONTHS; position++) {
    const { sigma, lambda } = regimeAt(truth, position);
    const surprise = stream.normal(sigma);
    const velocityShock = stream.normal(truth.sdVelocity);
    const outputShock = stream.normal(truth.sdOutput);
    money += growth(surprise);
    velocity += truth.velocityGrowth + velocityShock;
    gap = truth.rho * gap + (lambda ?? 0) * (surprise + velocityShock) + outputShock;
    if (position < 0) continue;
    const trend = truth.outputGrowth * position;
    record(history, { money, prices: money + velocity - trend - gap, trend, gap, surprise });
  }
  return history;
}

/** Prices go a small step of the way to where money would have them; output takes what is left. */
function withStickyPrices(truth: StickyTruth, stream: RandomStream): TrueHistory {
  const history = emptyHistory();
  const growth = moneyGrowth(truth);
  let [money, velocity, prices] = [0, 0, truth.outputGrowth * BURN_IN];
  for (let position = -BURN_IN; position < HISTORY_MONTHS; position++) {
    const surprise = stream.normal(truth.sigma);
    const velocityShock = stream.normal(truth.sdVelocity);
    const priceShock = stream.normal(truth.sdPrices);
    money += growth(surprise);
    velocity += truth.velocityGrowth + velocityShock;
    const trend = truth.outputGrowth * position;
    const flexible = money + velocity - trend;
    prices +=
      truth.priceDrift + truth.adjustment * (flexible - prices - truth.priceDrift) + priceShock;
    if (position < 0) continue;
    record(history, { money, prices, trend, gap: flexible - prices, surprise });
  }
  return history;
}

/** Money growth as an autoregression around its mean, started at the mean. */
function moneyGrowth(truth: { mean: number; phi: number[] }): (surprise: number) => number {
  const past = truth.phi.map(() => truth.mean);
  const constant = truth.mean * (1 - truth.phi.reduce((sum, phi) => sum + phi, 0));
  return (surprise) => {
    const growth = truth.phi.reduce((sum, phi, lag) => sum + phi * past[lag]!, constant) + surprise;
    past.unshift(growth);
    past.pop();
    return growth;
  };
}

function emptyHistory(): TrueHistory {
  return { money: [], prices: [], activity: [], surprise: [], gap: [], firstError: [] };
}

function record(
  history: TrueHistory,
  month: { money: number; prices: number; trend: number; gap: number; surprise: number },
): void {
  history.money.push(month.money);
  history.prices.push(month.prices);
  history.activity.push(month.trend + month.gap);
  history.surprise.push(month.surprise);
  history.gap.push(month.gap);
}
