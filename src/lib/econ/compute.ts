import { expect, isRegression } from './expectations/expect.ts';
import type { ExpectationPath } from './expectations/expectation.ts';
import { impliedGap } from './gap.ts';
import { accountForInflation } from './inflation.ts';
import { benchmarks } from './benchmarks.ts';
import { diagnose } from './diagnostics/diagnostics.ts';
import { neutrality } from './diagnostics/neutrality.ts';
import { formatPeriod } from './periods.ts';
import { RefusedError } from './refusal.ts';
import { prepare, type Data } from './series.ts';
import { activityEquation } from './slope/activity.ts';
import type { EstimationChoice } from './slope/estimate.ts';
import { needsActivityEquation, persistenceInUse, slopeInUse } from './slope/slope.ts';
import { termsOf } from './slope/terms.ts';
import type { ComputeRequest, ComputeResult, Fault, Slope, SlopeResult, Values } from './types.ts';
import { parseRequest } from './validate/request.ts';
import { warningsOf } from './warnings.ts';

/**
 * The contract's one function: expected money growth, surprises, slope, implied gap, accounting of inflation,
 * diagnostics and benchmarks, by the method. Pure: the same request gives the same bytes in every engine.
 * @param request The contract's request; a value of any other shape is refused.
 * @returns Arrays over `periods`, in log points; null where a value does not exist, and never a number that is not finite.
 * @throws RefusedError with every fault: those of form and of single values together, else those of the computation.
 */
export function compute(request: ComputeRequest): ComputeResult {
  const parsed = parseRequest(request);
  const result = assemble(parsed, prepare(parsed));
  refuseInfinite(result);
  return result;
}

function assemble(request: ComputeRequest, data: Data): ComputeResult {
  const { expectation: rule, slope, gap } = request;
  const faults: Fault[] = [];
  const attempt = <T>(step: () => T): T | null => {
    try {
      return step();
    } catch (error) {
      if (!(error instanceof RefusedError)) throw error;
      faults.push(...error.faults);
      return null;
    }
  };

  // Rules that learn by least squares have no surprise in their slope equations, and need ρ for the band; the others'
  // equations need the surprises, and their band no ρ: hence the two orders.
  const early = isRegression(rule) ? null : attempt(() => expect(data, rule, 0));
  const terms = termsOf(data, rule, early);
  const solvable = isRegression(rule) || early !== null;
  const activity =
    solvable && needsActivityEquation(slope, gap)
      ? attempt(() => activityEquation(terms, slope.method === 'activity' ? slope : {}))
      : null;
  const rho = persistenceInUse(gap, activity);
  const path =
    early ??
    (isRegression(rule) ? attempt(() => expect(data, rule, rho >= 0 && rho < 1 ? rho : 0)) : null);
  const inUse = solvable && attempt(() => slopeInUse(slope, gap, terms, path, activity));
  if (faults.length > 0 || path === null || !inUse) throw new RefusedError(faults);

  const implied = inUse.result.within_model
    ? impliedGap(path, inUse.parameters, request.confidence ?? 0.8)
    : null;
  const accounting =
    implied && accountForInflation(data, path, implied.gap, inUse.parameters, terms.seasons);
  const latestOrder = path.order?.[path.order.length - 1] ?? 0;
  const neutral = neutrality(terms, latestOrder, rho, estimationChoice(slope));
  const result: SlopeResult = { ...inUse.result, drift: accounting?.drift ?? null };
  return {
    ...surprises(data, path),
    slope: result,
    gap: implied?.gap ?? null,
    gap_lower: implied?.lower ?? null,
    gap_upper: implied?.upper ?? null,
    inflation: accounting?.inflation ?? null,
    diagnostics: diagnose(data, path, neutral),
    benchmarks: request.activity ? benchmarks(request.activity, data.frequency) : null,
    warnings: warningsOf(request, result, neutral),
  };
}

/** The slope's lags, and its window where the method is prices, for the neutrality test. */
function estimationChoice(slope: Slope): EstimationChoice {
  if (slope.method !== 'prices' && slope.method !== 'activity') return {};
  return { lags: slope.lags, window: slope.method === 'prices' ? slope.window : undefined };
}

function surprises(data: Data, path: ExpectationPath) {
  const { surprise, forecastError } = path;
  const errors: Values = Array.from(forecastError, (error) => (Number.isNaN(error) ? null : error));
  return {
    periods: Array.from(surprise, (_, i) =>
      formatPeriod({ frequency: data.frequency, index: data.start + path.first + i }),
    ),
    expected_growth: Array.from(path.expected),
    growth: Array.from(data.growth.subarray(path.first, path.first + surprise.length)),
    surprise: Array.from(surprise),
    forecast_se: errors,
    parameter_variance: Array.from(path.parameterVariance),
    standardised_surprise: errors.map((error, i) => (error ? surprise[i]! / error : null)),
    cumulated_surprise: cumulated(surprise, data.perYear),
    order: path.order,
  };
}

/** Sum of the last f surprises, summed anew each time so that no rounding accumulates; null until there are f. */
function cumulated(surprise: Float64Array, perYear: number): Values {
  return Array.from(surprise, (_, i) => {
    if (i + 1 < perYear) return null;
    let sum = 0;
    for (let j = i + 1 - perYear; j <= i; j++) sum += surprise[j]!;
    return sum;
  });
}

/** Refuses a result with a number that is not finite, which levels or assumptions of an absurd size can bring about. */
function refuseInfinite(value: unknown, path: (string | number)[] = []): void {
  if (typeof value === 'number') {
    if (Number.isFinite(value)) return;
    const message = `With these numbers ${path.join(' ')} is not a finite number. Check whether a level or an assumption is far too large or too small.`;
    throw new RefusedError([{ pointer: '', message }]);
  }
  if (typeof value !== 'object' || value === null) return;
  for (const [name, part] of Object.entries(value)) refuseInfinite(part, [...path, name]);
}
