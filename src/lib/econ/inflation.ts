import type { ExpectationPath } from './expectations/expectation.ts';
import { constant, equation } from './linear/equation.ts';
import { leastSquares } from './linear/leastSquares.ts';
import type { Data } from './series.ts';
import type { InflationResult, Values } from './types.ts';

/** The accounting of inflation with the drift of real balances; log points a period. */
export interface Accounting {
  /** Constant of v: the drift of real balances (the first season's with indicators). */
  drift: number;
  inflation: InflationResult;
}

/**
 * π_t = [d_t − u_t − v_t] + (1−λ)u_t + (1−ρ)g_{t−1} + e_t, exact by construction (method, section 4). v_t is fitted by
 * least squares of w_t − (g_t − g_{t−1}) on 1 and indicators over the periods where both gaps are shown.
 * @param gap Shown gaps, one a target, null where withheld.
 * @param seasons Seasonal indicators over money's periods, or none.
 * @returns null where there are no prices, too few such periods, or a season is absent from them.
 */
export function accountForInflation(
  data: Data,
  path: ExpectationPath,
  gap: Values,
  { lambda, rho }: { lambda: number; rho: number },
  seasons: Float64Array[],
): Accounting | null {
  if (!data.hasPrices) return null;
  const unexplainedBalances = new Float64Array(data.length).fill(NaN);
  for (let i = 1; i < gap.length; i++) {
    const now = gap[i] ?? null;
    const before = gap[i - 1] ?? null;
    if (now === null || before === null) continue;
    const t = path.first + i;
    unexplainedBalances[t] = data.realBalances[t]! - (now - before);
  }
  const columns = [constant(data.length), ...seasons];
  const rows = equation(unexplainedBalances, columns);
  if (rows.rows.length <= columns.length) return null;
  const fit = leastSquares(rows.columns, rows.y);
  if (fit === null) return null;

  const inflation: InflationResult = {
    actual: [],
    expected_money: [],
    current_surprise: [],
    carry_over: [],
    unexplained: [],
  };
  path.surprise.forEach((surprise, i) => {
    const t = path.first + i;
    const actual = data.inflation[t]!;
    const exists = !Number.isNaN(actual);
    let trend = 0;
    columns.forEach((column, j) => (trend += fit.coefficients[j]! * column[t]!));
    const expectedMoney = data.growth[t]! - surprise - trend;
    const current = (1 - lambda) * surprise;
    const before = i > 0 ? gap[i - 1]! : null;
    const carryOver = before === null ? null : (1 - rho) * before;
    inflation.actual.push(exists ? actual : null);
    inflation.expected_money.push(exists ? expectedMoney : null);
    inflation.current_surprise.push(exists ? current : null);
    inflation.carry_over.push(exists ? carryOver : null);
    inflation.unexplained.push(
      exists && carryOver !== null ? actual - expectedMoney - current - carryOver : null,
    );
  });
  return { drift: fit.coefficients[0]!, inflation };
}
