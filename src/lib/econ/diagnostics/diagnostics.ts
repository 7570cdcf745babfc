import type { ExpectationPath } from '../expectations/expectation.ts';
import type { Data } from '../series.ts';
import type { DiagnosticsResult, NeutralityResult } from '../types.ts';
import { dickeyFuller } from './dickeyFuller.ts';
import { jarqueBera, ljungBox, sizeOfSurprise } from './surprise.ts';

/** Every diagnostic of method section 5, with the neutrality test of section 3 as computed elsewhere. */
export function diagnose(
  data: Data,
  path: ExpectationPath,
  neutrality: NeutralityResult | null,
): DiagnosticsResult {
  return {
    surprise: sizeOfSurprise(path.surprise),
    ljung_box: ljungBox(path.surprise, data.perYear),
    jarque_bera: jarqueBera(path.surprise),
    adf_money: dickeyFuller(data.money, 'constant_and_trend'),
    adf_growth: dickeyFuller(data.growth.subarray(1), 'constant'),
    neutrality,
  };
}
