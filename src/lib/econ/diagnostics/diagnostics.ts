import type { ExpectationPath } from '../expectations/expectation.ts';
import type { Data } from '../series.ts';
import type { DiagnosticsResult, NeutralityResult } from '../types.ts';
import { dickeyFuller } from './dickeyFuller.ts';
import { allAlike, jarqueBera, ljungBox, sizeOfSurprise } from './surprise.ts';

/** Every diagnostic of method section 5, with the neutrality test of section 3 as computed elsewhere. */
export function diagnose(
  data: Data,
  path: ExpectationPath,
  neutrality: NeutralityResult | null,
): DiagnosticsResult {
  const { surprise } = path;
  const { rounding } = data;
  const growth = data.growth.subarray(1);
  return {
    surprise: sizeOfSurprise(surprise, rounding),
    ljung_box: ljungBox(surprise, data.perYear, rounding),
    jarque_bera: jarqueBera(surprise, rounding),
    adf_money: dickeyFuller(data.money, 'constant_and_trend'),
    adf_growth: allAlike(growth, rounding) ? null : dickeyFuller(growth, 'constant'),
    neutrality,
  };
}
