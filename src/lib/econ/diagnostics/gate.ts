import type { NeutralityResult } from '../types.ts';

/** Significance at which the model's own test closes the gate on the gap (the method, section 3). */
export const GATE_LEVEL = 0.01;

/** Whether neutrality is rejected, so that the gap is an assumption and not an estimate; null where it was not tested. */
export function isRejected(neutrality: Pick<NeutralityResult, 'p'> | null): boolean | null {
  const p = neutrality?.p ?? null;
  return p === null ? null : p < GATE_LEVEL;
}
