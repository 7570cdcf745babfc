import { isRejected } from './diagnostics/gate.ts';
import { PERIODS_A_YEAR, parsePeriod } from './periods.ts';
import type { ComputeResult, Values } from './types.ts';

const RANKED_YEARS = 10;

/** A value and the period that proves it; log points. */
export interface Dated {
  period: string;
  value: number;
}

/** What may be said of an indicator's latest value; every statement names the periods that prove it. */
export interface IndicatorFacts extends Dated {
  side: 'above' | 'below' | 'level';
  /** Change from the period before, within this history. Null where that has no value. */
  change: (Dated & { before: number }) | null;
  /**
   * The last earlier period whose value lay at least as far on the same side; `period` null where none did since
   * `from`. Null for a level value.
   */
  largest_since: { period: string | null; value: number | null; from: string } | null;
  /** Rank within the last ten years, this period included: 1 is the highest, or the largest in size. */
  rank: { from_top: number; by_size: number; of: number; from: string; to: string };
  /** Unbroken run of periods on the same side, this one included; null for a level value. */
  run: { periods: number; from: string; to: string } | null;
}

/** How a figure of an earlier release stands in this one. */
export interface RevisedFigure {
  period: string;
  indicator: 'surprise' | 'gap';
  /** As that release had it. */
  before: number;
  now: number;
  change: number;
}

/** What the numbers of a release allow a writer to say of its latest period. */
export interface Facts {
  period: string;
  surprise: IndicatorFacts;
  /** Periods whose surprise lies within plus or minus its own forecast standard error; null where none has one. */
  typical_range: {
    inside: number;
    of: number;
    share: number;
    from: string;
    to: string;
    latest_inside: boolean | null;
  } | null;
  /** Null where no gap is implied. */
  gap: IndicatorFacts | null;
  /** The gap's band in the latest period, and whether it leaves out zero. */
  band: { lower: number; upper: number; leaves_out_zero: boolean } | null;
  /** Neutrality is rejected at 1%: the gap is an assumption, not an estimate. Null where it was not tested. */
  neutrality_rejected: boolean | null;
  /** Figures of earlier releases whose period is in this history, in the order given. */
  revised: RevisedFigure[];
}

/** A figure as an earlier release published it. */
export interface ReleasedFigure {
  period: string;
  surprise?: number | null;
  gap?: number | null;
}

/**
 * Facts of a result, computed and never typed, so that a writer's sentence can be bound to them.
 * @param history Figures as earlier releases published them, for what was revised; may be empty.
 */
export function facts(result: ComputeResult, history: readonly ReleasedFigure[] = []): Facts {
  const { periods, surprise, gap, diagnostics } = result;
  const last = periods.length - 1;
  const lower = result.gap_lower?.[last] ?? null;
  const upper = result.gap_upper?.[last] ?? null;
  return {
    period: periods[last]!,
    surprise: factsOf(periods, surprise)!,
    typical_range: typicalRange(result),
    gap: gap === null ? null : factsOf(periods, gap),
    band:
      lower === null || upper === null
        ? null
        : { lower, upper, leaves_out_zero: lower > 0 || upper < 0 },
    neutrality_rejected: isRejected(diagnostics.neutrality),
    revised: revised(result, history),
  };
}

/** Facts of the last value; null where it does not exist. */
function factsOf(periods: readonly string[], values: Values): IndicatorFacts | null {
  const last = values.length - 1;
  const value = values[last] ?? null;
  if (value === null) return null;
  const before = values[last - 1] ?? null;
  const side = Math.sign(value);
  return {
    period: periods[last]!,
    value,
    side: side > 0 ? 'above' : side < 0 ? 'below' : 'level',
    change: before === null ? null : { period: periods[last - 1]!, before, value: value - before },
    largest_since: side === 0 ? null : largestSince(periods, values, value, side),
    rank: rank(periods, values, value),
    run: side === 0 ? null : run(periods, values, side),
  };
}

function largestSince(periods: readonly string[], values: Values, value: number, side: number) {
  let from = values.length - 1;
  for (let i = values.length - 2; i >= 0; i--) {
    const earlier = values[i] ?? null;
    if (earlier === null) continue;
    from = i;
    if (side * earlier >= side * value) {
      return { period: periods[i]!, value: earlier, from: periods[i]! };
    }
  }
  return { period: null, value: null, from: periods[from]! };
}

function rank(periods: readonly string[], values: Values, value: number): IndicatorFacts['rank'] {
  const last = values.length - 1;
  const { frequency } = parsePeriod(periods[last]!);
  const start = Math.max(0, values.length - RANKED_YEARS * PERIODS_A_YEAR[frequency]);
  let from = last;
  let of = 0;
  let higher = 0;
  let larger = 0;
  for (let i = last; i >= start; i--) {
    const other = values[i] ?? null;
    if (other === null) continue;
    from = i;
    of++;
    if (other > value) higher++;
    if (Math.abs(other) > Math.abs(value)) larger++;
  }
  return {
    from_top: higher + 1,
    by_size: larger + 1,
    of,
    from: periods[from]!,
    to: periods[last]!,
  };
}

function run(periods: readonly string[], values: Values, side: number) {
  const last = values.length - 1;
  let first = last;
  while (first > 0 && Math.sign(values[first - 1] ?? 0) === side) first--;
  return { periods: last - first + 1, from: periods[first]!, to: periods[last]! };
}

function typicalRange({
  periods,
  surprise,
  forecast_se: errors,
}: ComputeResult): Facts['typical_range'] {
  const known = errors.flatMap((error, i) => (error === null ? [] : [i]));
  if (known.length === 0) return null;
  const inside = known.filter((i) => Math.abs(surprise[i]!) <= errors[i]!);
  const last = surprise.length - 1;
  return {
    inside: inside.length,
    of: known.length,
    share: inside.length / known.length,
    from: periods[known[0]!]!,
    to: periods[known[known.length - 1]!]!,
    latest_inside: errors[last] === null ? null : inside.includes(last),
  };
}

function revised(result: ComputeResult, history: readonly ReleasedFigure[]): RevisedFigure[] {
  const at = new Map(result.periods.map((period, i) => [period, i]));
  return history.flatMap((figure) => {
    const i = at.get(figure.period);
    if (i === undefined) return [];
    return (['surprise', 'gap'] as const).flatMap((indicator) => {
      const before = figure[indicator] ?? null;
      const now = result[indicator]?.[i] ?? null;
      if (before === null || now === null) return [];
      return [{ period: figure.period, indicator, before, now, change: now - before }];
    });
  });
}
