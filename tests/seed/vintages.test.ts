import { describe, expect, test } from 'vitest';
import { demoEconomies } from '../../seed/economies.ts';
import { demoData, vintageCsv } from '../../seed/vintages.ts';
import { compute } from '../../src/lib/econ/compute.ts';
import type { ComputeResult } from '../../src/lib/econ/types.ts';

const NEWEST = 359;
const START = '2001-09';

function computed(code: string): ComputeResult {
  const economy = demoEconomies.find((candidate) => candidate.code === code)!;
  const vintage = demoData(economy).vintage(NEWEST);
  const series = (values: string[]) => ({ start: START, values: values.map(Number) });
  return compute({
    frequency: 'monthly',
    money: series(vintage.money),
    prices: series(vintage.prices),
    activity: series(vintage.activity),
    ...economy.assumptions,
  });
}

describe.each(demoEconomies)('the files of $name', (economy) => {
  const data = demoData(economy);
  const vintages = [355, 356, 357, 358, 359].map((position) => data.vintage(position));

  test('are the same bytes whenever they are made', () => {
    expect(vintageCsv(demoData(economy).vintage(NEWEST), START)).toBe(
      vintageCsv(vintages.at(-1)!, START),
    );
  });

  test('name every month once, with positive levels of at least four digits', () => {
    const lines = vintageCsv(vintages.at(-1)!, START).trimEnd().split('\n');
    expect(lines[0]).toBe('period,money,prices,activity');
    expect(lines).toHaveLength(361);
    expect(lines[1]).toMatch(/^2001-09,/);
    expect(lines.at(-1)).toMatch(/^2031-08,/);
    for (const line of lines.slice(1)) {
      for (const level of line.split(',').slice(1)) {
        expect(level).toMatch(/^\d+\.\d{2,}$/);
        expect(Number(level)).toBeGreaterThan(0);
        expect(level.replace('.', '').replace(/^0+/, '').length).toBeGreaterThanOrEqual(4);
      }
    }
  });

  test('revise money in the month after and then no more', () => {
    vintages.slice(0, 3).forEach((vintage, i) => {
      const month = vintage.money.length - 1;
      const [first, second, third] = [0, 1, 2].map((on) => vintages[i + on]!.money[month]!);
      const final = vintages.at(-1)!.money[month];
      expect(third).toBe(final);
      const error = data.truth.firstError[month]!;
      const off = (level: string) => 100 * Math.log(Number(level) / Number(third));
      expect(off(first!)).toBeCloseTo(error, 1);
      expect(off(second!)).toBeCloseTo(0.4 * error, 1);
    });
    const [before, after] = vintages.slice(-2) as [(typeof vintages)[0], (typeof vintages)[0]];
    expect(after.money.slice(0, -3)).toEqual(before.money.slice(0, -2));
  });

  test('never revise activity, nor prices but by their base year', () => {
    const [first, last] = [vintages[0]!, vintages.at(-1)!];
    expect(last.activity.slice(0, first.activity.length)).toEqual(first.activity);
    const ratios = first.prices.map((level, i) => Number(last.prices[i]) / Number(level));
    const rebased = economy.code === 'XAL';
    expect(ratios.every((ratio) => Math.abs(ratio - 1) < 0.001)).toBe(!rebased);
    expect(Math.max(...ratios) / Math.min(...ratios)).toBeLessThan(1.0005);
  });
});

test('prices of Aldermark are rebased once', () => {
  const aldermark = demoEconomies.find(({ code }) => code === 'XAL')!;
  const data = demoData(aldermark);
  const firsts = Array.from({ length: 24 }, (_, i) => data.vintage(336 + i).prices[0]);
  expect(firsts.filter((level, i) => i > 0 && level !== firsts[i - 1])).toHaveLength(1);
});

describe('what the product finds in them', () => {
  const truths: [string, number][] = [
    ['XAL', 0.362],
    ['XCL', 0.156],
  ];
  test.each(truths)('the output share of %s lies within its error of the truth', (code, lambda) => {
    const { slope } = computed(code);
    expect(Math.abs(slope.lambda - lambda) / slope.se_lambda!).toBeLessThan(2.5);
  });

  test('only Estavel rejects the model', () => {
    for (const { code } of demoEconomies) {
      const rejected = computed(code).diagnostics.neutrality!.p! < 0.01;
      expect(rejected, code).toBe(code === 'XES');
    }
  });

  test('gaps stay in a range that a newsroom would print', () => {
    for (const { code } of demoEconomies) {
      const gaps = computed(code).gap!.filter((gap) => gap !== null);
      expect(Math.max(...gaps.map(Math.abs)), code).toBeLessThan(code === 'XES' ? 3 : 1.2);
    }
  });
});
