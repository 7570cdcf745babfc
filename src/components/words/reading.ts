import type { ComputeRequest, ComputeResult } from '../../lib/econ/types.ts';
import {
  gapWording,
  hasPersistence,
  isGapAssumption,
} from '../../lib/services/releases/sentences.ts';
import { capitalised } from './counting.ts';

/** What may be said of a gap: `none` where the estimate lies outside the model or nothing is shown yet. */
export type GapStanding = 'estimate' | 'assumption' | 'outside' | 'none';

/** The figures of one period of a result, in log points (gap: per cent of output), and what may be said of them. */
export interface Reading {
  period: string;
  growth: number;
  expected: number;
  surprise: number;
  forecastSe: number | null;
  standardised: number | null;
  cumulated: number | null;
  /** Surprise less that of the period before, within this result; null at its first period. */
  change: number | null;
  previousSurprise: number | null;
  gap: number | null;
  lower: number | null;
  upper: number | null;
  standing: GapStanding;
  /** Without persistence what is shown is not a gap. */
  persistent: boolean;
  /** What the effect on output is called: a gap only where there is persistence. */
  name: string;
  /** The persistence in use; 0 for none, null where it was to be estimated and is not known. */
  rho: number | null;
  confidence: number;
}

/** The persistence a computation used: none is 0; an estimate comes from its result. */
export function persistenceInUse(
  request: Pick<ComputeRequest, 'gap'>,
  result: Pick<ComputeResult, 'slope'>,
): number | null {
  const given = request.gap?.persistence ?? 'none';
  if (given === 'none') return 0;
  return given === 'estimated' ? result.slope.rho : given;
}

/** Reads one period of a computed release. Throws where the period has no surprise in it. */
export function readingOf({
  period,
  request,
  result,
}: {
  period: string;
  request: ComputeRequest;
  result: ComputeResult;
}): Reading {
  const at = result.periods.indexOf(period);
  if (at < 0) throw new Error(`The result has no surprise for ${period}.`);
  const surprise = result.surprise[at]!;
  const previousSurprise = result.surprise[at - 1] ?? null;
  const rho = persistenceInUse(request, result);
  const gap = result.gap?.[at] ?? null;
  const rejected = isGapAssumption(result);
  return {
    period,
    growth: result.growth[at]!,
    expected: result.expected_growth[at]!,
    surprise,
    forecastSe: result.forecast_se[at] ?? null,
    standardised: result.standardised_surprise[at] ?? null,
    cumulated: result.cumulated_surprise[at] ?? null,
    change: previousSurprise === null ? null : surprise - previousSurprise,
    previousSurprise,
    gap,
    lower: rejected ? null : (result.gap_lower?.[at] ?? null),
    upper: rejected ? null : (result.gap_upper?.[at] ?? null),
    standing: !result.slope.within_model
      ? 'outside'
      : gap === null
        ? 'none'
        : rejected
          ? 'assumption'
          : 'estimate',
    persistent: hasPersistence(request),
    name: capitalised(gapWording(request, period)),
    rho,
    confidence: request.confidence ?? 0.8,
  };
}
