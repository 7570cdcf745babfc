import { hasPersistence } from '../releases/sentences.ts';
import { isRejected } from '../../econ/diagnostics/gate.ts';
import type { ComputeRequest, ComputeResult, Frequency, Values } from '../../econ/types.ts';

/** The series an economy's desk loads; their values are a file's own. */
export const INPUT_CONCEPTS = ['money', 'prices', 'activity'] as const;
export type InputConcept = (typeof INPUT_CONCEPTS)[number];

/** A concept that a release computes, and where its values are found in `release_value`. */
export interface DerivedConcept {
  concept: string;
  title: string;
  /** Of its values, for each frequency. */
  unit: (frequency: Frequency) => string;
  indicator: string;
  column: 'value' | 'lower' | 'upper';
  /** As the latest release has it, or each period as it was first published. */
  history: 'latest' | 'first';
}

const NOUN: Record<Frequency, string> = { monthly: 'month', quarterly: 'quarter', annual: 'year' };
const SUM: Record<Frequency, string> = {
  monthly: 'log points, sum of 12 months',
  quarterly: 'log points, sum of 4 quarters',
  annual: 'log points',
};

const growth = (frequency: Frequency) => `log points a ${NOUN[frequency]}`;
const points = () => 'log points';
const ofOutput = () => 'log points of output';

function derived(
  concept: string,
  title: string,
  unit: DerivedConcept['unit'],
  from: Partial<Pick<DerivedConcept, 'indicator' | 'column' | 'history'>> = {},
): DerivedConcept {
  return { concept, title, unit, indicator: concept, column: 'value', history: 'latest', ...from };
}

/** Every concept a release may publish, in the order readers find them. */
export const DERIVED_CONCEPTS: readonly DerivedConcept[] = [
  derived('money_growth', 'Money growth', growth),
  derived('expected_money_growth', 'Expected money growth', growth),
  derived('money_surprise', 'Money surprise', points),
  derived(
    'money_surprise_standardised',
    'Money surprise, standardised',
    () => 'standard errors of the expectation',
  ),
  derived('money_surprise_cumulated', 'Money surprise, cumulated over a year', (f) => SUM[f]),
  derived('money_surprise_first', 'Money surprise, as first published', points, {
    indicator: 'money_surprise',
    history: 'first',
  }),
  derived('implied_gap', 'Implied output gap', ofOutput),
  derived('implied_gap_lower', 'Implied output gap, lower end of the band', ofOutput, {
    indicator: 'implied_gap',
    column: 'lower',
  }),
  derived('implied_gap_upper', 'Implied output gap, upper end of the band', ofOutput, {
    indicator: 'implied_gap',
    column: 'upper',
  }),
  derived('implied_gap_first', 'Implied output gap, as first published', ofOutput, {
    indicator: 'implied_gap',
    history: 'first',
  }),
  derived('output_effect', 'Same-period output effect of the surprise', ofOutput),
  derived('output_effect_lower', 'Same-period output effect, lower end of the band', ofOutput, {
    indicator: 'output_effect',
    column: 'lower',
  }),
  derived('output_effect_upper', 'Same-period output effect, upper end of the band', ofOutput, {
    indicator: 'output_effect',
    column: 'upper',
  }),
  derived('inflation', 'Inflation', growth),
  derived('inflation_expected_money', 'Inflation: expected money less trend', growth),
  derived('inflation_current_surprise', 'Inflation: pass-through of the surprise', growth),
  derived('inflation_carry_over', 'Inflation: carry-over of earlier surprises', growth),
  derived('inflation_unexplained', 'Inflation: unexplained', growth),
];

const LETTER: Record<Frequency, string> = { monthly: 'M', quarterly: 'Q', annual: 'A' };

/** The stable name of a series: `XAL.money_surprise.M`. */
export function seriesId(economy: string, concept: string, frequency: Frequency): string {
  return `${economy}.${concept}.${LETTER[frequency]}`;
}

/** A row of `release_value`, without its release. Log points; null where a value does not exist. */
export interface ReleaseValue {
  indicator: string;
  period: string;
  value: number | null;
  lower: number | null;
  upper: number | null;
}

/**
 * The values a release publishes, one for each indicator and period of the result, indicators in a fixed order.
 * Where neutrality is rejected at 1% the gap keeps its value and loses its band; without persistence it is the
 * output effect. An indicator that the result lacks altogether (no prices, outside the model) has no rows.
 */
export function valuesOf(result: ComputeResult, request: ComputeRequest): ReleaseValue[] {
  const { inflation } = result;
  const gap = hasPersistence(request) ? 'implied_gap' : 'output_effect';
  const isAssumption = isRejected(result.diagnostics.neutrality) === true;
  const columns: [string, Values | null, (Values | null)?, (Values | null)?][] = [
    ['money_growth', result.growth],
    ['expected_money_growth', result.expected_growth],
    ['money_surprise', result.surprise],
    ['money_surprise_standardised', result.standardised_surprise],
    ['money_surprise_cumulated', result.cumulated_surprise],
    isAssumption ? [gap, result.gap] : [gap, result.gap, result.gap_lower, result.gap_upper],
    ['inflation', inflation?.actual ?? null],
    ['inflation_expected_money', inflation?.expected_money ?? null],
    ['inflation_current_surprise', inflation?.current_surprise ?? null],
    ['inflation_carry_over', inflation?.carry_over ?? null],
    ['inflation_unexplained', inflation?.unexplained ?? null],
  ];
  return columns.flatMap(([indicator, values, lower, upper]) =>
    (values ?? []).map((value, i) => ({
      indicator,
      period: result.periods[i]!,
      value,
      lower: lower?.[i] ?? null,
      upper: upper?.[i] ?? null,
    })),
  );
}
