import { sampleVariance } from '../moments.ts';
import type { ExpectationPath } from '../expectations/expectation.ts';
import type { GapParameters } from '../gap.ts';
import { RefusedError } from '../refusal.ts';
import type { Gap, Slope, SlopeResult } from '../types.ts';
import type { ActivityEstimate } from './activity.ts';
import { lambdaFromPrices, type LambdaEstimate } from './prices.ts';
import { structuralRoots } from './structural.ts';
import type { Terms } from './terms.ts';

/** A slope as the result reports it (`drift` still null) and as the gap uses it. */
export interface SlopeInUse {
  result: SlopeResult;
  parameters: GapParameters;
}

/** ρ in use: 0, as given, or as the activity equation estimates it. */
export function persistenceInUse(gap: Gap | undefined, activity: ActivityEstimate | null): number {
  const persistence = gap?.persistence ?? 'none';
  if (persistence === 'none') return 0;
  return persistence === 'estimated' ? (activity?.rho ?? NaN) : persistence;
}

/** Whether the activity equation has to be run: for λ, or for ρ. */
export function needsActivityEquation(slope: Slope, gap: Gap | undefined): boolean {
  return slope.method === 'activity' || gap?.persistence === 'estimated';
}

/** λ and what the result tells of it, before anything is known of the model's bounds. */
interface Share {
  lambda: number;
  b: number;
  seLambda: number | null;
  roots: number[] | null;
  estimate: LambdaEstimate | null;
}

/**
 * The slope by its method, with persistence (method, section 3). Estimates outside the model are reported and never
 * clipped: then b and its error are null (a given or solved b stays) and nothing is implied from them.
 * @param path Null where the rule was refused; then what needs its surprises is refused without a further fault.
 * @param activity The activity equation, where it was run.
 * @throws RefusedError where the method cannot be carried out on these data.
 */
export function slopeInUse(
  slope: Slope,
  gap: Gap | undefined,
  terms: Terms,
  path: ExpectationPath | null,
  activity: ActivityEstimate | null,
): SlopeInUse {
  const share = shareOf(slope, terms, path, activity);
  const { lambda, seLambda, estimate } = share;
  const rho = persistenceInUse(gap, activity);
  const within = lambda > 0 && lambda < 1 && rho >= 0 && rho < 1;
  const rest = 1 - lambda;
  const rhoEstimated = gap?.persistence === 'estimated' && activity !== null;
  return {
    result: {
      method: slope.method,
      b: within || estimate === null ? share.b : null,
      lambda,
      se_lambda: seLambda,
      se_b: within && seLambda !== null ? seLambda / rest / rest : null,
      rho: activity?.rho ?? null,
      se_rho: activity?.seRho ?? null,
      roots: share.roots,
      no_response:
        slope.method === 'prices' ? { lambda: 1, t: (lambda - 1) / (seLambda ?? NaN) } : null,
      drift: null,
      observations: estimate?.observations ?? null,
      lags: estimate?.lags ?? null,
      within_model: within,
    },
    parameters: {
      lambda,
      rho,
      varianceLambda: seLambda === null ? 0 : seLambda * seLambda,
      varianceRho: rhoEstimated ? activity.seRho * activity.seRho : 0,
      covariance: rhoEstimated && slope.method === 'activity' ? activity.covariance : 0,
    },
  };
}

function shareOf(
  slope: Slope,
  terms: Terms,
  path: ExpectationPath | null,
  activity: ActivityEstimate | null,
): Share {
  if (slope.method === 'fixed') {
    return { ...known(slope.b, null), seLambda: slope.se_lambda ?? null };
  }
  if (slope.method === 'structural') {
    const roots = structuralRoots({
      gamma: slope.gamma,
      eta: slope.eta,
      relativeDemandVariance: slope.relative_demand_variance,
      moneyVariance: slope.money_variance ?? varianceOfSurprises(path),
    });
    return known(roots[0] ?? NaN, roots);
  }
  const estimate = slope.method === 'prices' ? lambdaFromPrices(terms, slope) : activity;
  if (estimate === null) throw new RefusedError([]);
  const { lambda, seLambda } = estimate;
  return { lambda, b: lambda / (1 - lambda), seLambda, roots: null, estimate };
}

function known(b: number, roots: number[] | null): Share {
  return { lambda: b / (1 + b), b, seLambda: null, roots, estimate: null };
}

function varianceOfSurprises(path: ExpectationPath | null): number {
  if (path === null) throw new RefusedError([]);
  const variance = sampleVariance(path.surprise);
  if (variance !== null) return variance;
  throw new RefusedError([
    {
      pointer: '/money/values',
      message:
        'The variance of the surprises needs at least two of them, and the money series gives one. Load a longer series or give money_variance.',
    },
  ]);
}
