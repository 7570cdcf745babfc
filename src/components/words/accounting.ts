import { accountingFigure, growthFigure, growthSize, unsigned } from '../../lib/charts/figures.ts';
import { partNames, partOrder, type PartName } from '../../lib/charts/inflationParts.ts';
import type { InflationResult } from '../../lib/econ/types.ts';
import { listed } from './counting.ts';

export interface Part {
  name: PartName;
  title: string;
  /** Log points; null where the accounting has no such part for the period. */
  value: number | null;
  figure: string;
}

/** The accounting of one period: its parts, their sum, and whether the printed figures add up. */
export interface Accounting {
  parts: Part[];
  /** Inflation in log points. */
  total: number;
  totalFigure: string;
  /** Whether the printed parts sum to the printed total. */
  adds: boolean;
  isComplete: boolean;
}

/** The accounting of the period at `index`; null where inflation or every part is missing. */
export function accountingOf(
  inflation: InflationResult | null,
  index: number,
  period: string,
): Accounting | null {
  const total = inflation?.actual[index] ?? null;
  if (!inflation || total === null) return null;
  const titles = partNames(period);
  const parts = partOrder.map((name) => {
    const value = inflation[name][index] ?? null;
    return { name, title: titles[name], value, figure: accountingFigure(value) };
  });
  if (parts.every(({ value }) => value === null)) return null;
  const isComplete = parts.every(({ value }) => value !== null);
  return {
    parts,
    total,
    totalFigure: accountingFigure(total),
    adds:
      isComplete &&
      sumsInPrint(
        parts.map(({ value }) => value ?? 0),
        total,
      ),
    isComplete,
  };
}

/** Whether figures rounded to two places one by one add to the rounded total, counted in hundredths. */
export function sumsInPrint(values: number[], total: number): boolean {
  const hundredths = (value: number) => Math.round(Number(value.toFixed(2)) * 100);
  return values.reduce((sum, value) => sum + hundredths(value), 0) === hundredths(total);
}

/** What prices did and how the model divides it, as running text. */
export function accountingWords({ parts, total }: Accounting, pricesTitle: string): string {
  const of = (name: PartName) => parts.find((part) => part.name === name)?.value ?? null;
  const change = growthSize(total);
  const verb =
    growthFigure(total) === growthFigure(0) ? 'were unchanged' : total < 0 ? 'fell' : 'rose';
  const first = `${pricesTitle} ${verb}${verb === 'were unchanged' ? '' : ` ${change} per cent`}.`;
  const named: string[] = [];
  const add = (name: PartName, words: string) => {
    const value = of(name);
    if (value !== null) named.push(`${words} for ${accountingFigure(value)}`);
  };
  add('expected_money', 'expected money less trend accounts');
  add('current_surprise', 'the surprise');
  add('carry_over', 'carry-over from earlier surprises');
  const rest = of('unexplained');
  const sentences = [first];
  if (named.length > 0) {
    const text = listed(named);
    sentences.push(`In log points, ${text}.`);
  }
  if (rest !== null) {
    const size = unsigned(Math.abs(rest), 2);
    sentences.push(
      Math.abs(rest) < 0.005
        ? 'Nothing is left unexplained.'
        : `That leaves ${size} points unexplained: ${pricesTitle.toLowerCase()} ${total < 0 ? 'fell' : 'rose'} by ${rest > 0 === total >= 0 ? 'more' : 'less'} than the model allows for.`,
    );
  }
  return sentences.join(' ');
}
