import { isRejected } from './diagnostics/gate.ts';
import type { ComputeRequest, NeutralityResult, SlopeResult } from './types.ts';

const NO_RESPONSE_T = 2;

/** Sentences a reader must see beside the numbers, in the contract's order. */
export function warningsOf(
  request: ComputeRequest,
  slope: SlopeResult,
  neutrality: NeutralityResult | null,
): string[] {
  const warnings: string[] = [];
  if (!slope.within_model) {
    warnings.push(
      'The estimates lie outside the model (the output share must lie between 0 and 1, persistence from 0 to below 1), so no gap is implied.',
    );
  }
  if (slope.roots !== null && slope.roots.length > 1) {
    warnings.push(
      `The structural slope has ${slope.roots.length} solutions; the smallest is used, and all are listed.`,
    );
  }
  if (isRejected(neutrality)) {
    warnings.push(
      'Prices do not behave as the model requires: neutrality is rejected at 1%, so the gap is an assumption, not an estimate.',
    );
  }
  if (slope.no_response !== null && Math.abs(slope.no_response.t) < NO_RESPONSE_T) {
    warnings.push('Prices show no detectable response to money within the period.');
  }
  const { timing: money } = request.money;
  const prices = request.prices?.timing;
  if (money !== undefined && prices !== undefined && money !== prices) {
    warnings.push(
      'Money and prices are dated differently, one at the end of the period and one averaged over it, which moves an output share estimated from prices towards about (1 + share)/2.',
    );
  }
  return warnings;
}
