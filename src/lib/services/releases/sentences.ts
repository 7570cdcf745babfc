import { periodLabel, periodNoun } from '../../charts/periodLabels.ts';
import { isRejected } from '../../econ/diagnostics/gate.ts';
import { addPeriods } from '../../econ/periods.ts';
import type { Assumptions, ComputeResult } from '../../econ/types.ts';

/** Whether the neutrality test rejects, so that the gap is an assumption and not an estimate. */
export function isGapAssumption(result: Pick<ComputeResult, 'diagnostics'>): boolean {
  return isRejected(result.diagnostics.neutrality) === true;
}

/** Whether the assumptions have persistence: without it what is shown is not a gap. */
export function hasPersistence({ gap }: Pick<Assumptions, 'gap'>): boolean {
  const persistence = gap?.persistence ?? 'none';
  return persistence !== 'none' && persistence !== 0;
}

/** What the gap is called: "implied output gap", or without persistence "same-month output effect of the surprise". */
export function gapWording(assumptions: Pick<Assumptions, 'gap'>, period: string): string {
  return hasPersistence(assumptions)
    ? 'implied output gap'
    : `same-${periodNoun(period)} output effect of the surprise`;
}

/** The sentence on the gap that must stand beside it; null where the gap is an ordinary estimate. */
export function gapSentence(
  result: Pick<ComputeResult, 'diagnostics' | 'slope'>,
  economyInText: string,
): string | null {
  if (!result.slope.within_model) {
    return `No gap is published for ${economyInText}: the estimate lies outside what the model allows.`;
  }
  return isGapAssumption(result)
    ? `Prices in ${economyInText} do not behave as the model requires; the gap is an assumption, not an estimate.`
    : null;
}

/** The house sentence on timing: "The expectation uses months to July 2031, as revised in this vintage." */
export function timingSentence(period: string): string {
  const before = periodLabel(addPeriods(period, -1));
  return `The expectation uses ${periodNoun(period)}s to ${before}, as revised in this vintage.`;
}
