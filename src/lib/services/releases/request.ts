import { periodDifference } from '../../econ/periods.ts';
import type {
  Assumptions,
  ComputeRequest,
  Frequency,
  LevelSeries,
  Timing,
} from '../../econ/types.ts';

export interface InputSeries {
  concept: 'money' | 'prices' | 'activity';
  timing: Timing | null;
  start: string;
  /** The digits of the file. */
  values: string[];
}

/** The contract's request of a release: the vintage cut at the reference period, so that nothing later enters. */
export function requestOf(
  frequency: Frequency,
  period: string,
  series: InputSeries[],
  assumptions: Assumptions,
): ComputeRequest {
  const cut = (concept: InputSeries['concept']): LevelSeries | undefined => {
    const found = series.find((one) => one.concept === concept);
    if (!found) return undefined;
    const kept = periodDifference(found.start, period) + 1;
    const values = found.values.slice(0, Math.max(kept, 0)).map(Number);
    if (values.length === 0) return undefined;
    return { start: found.start, values, ...(found.timing && { timing: found.timing }) };
  };
  const money = cut('money');
  if (!money) throw new RangeError(`There is no money up to ${period}.`);
  const prices = cut('prices');
  const activity = cut('activity');
  return {
    frequency,
    money,
    ...(prices && { prices }),
    ...(activity && { activity }),
    ...assumptions,
  };
}
