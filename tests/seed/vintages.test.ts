import { describe, expect, test } from 'vitest';
import { demoEconomies } from '../../seed/economies.ts';
import type { ModelTruth } from '../../seed/economy.ts';
import { type DemoData, demoData, vintageCsv } from '../../seed/vintages.ts';
import { addPeriods } from '../../src/lib/econ/periods.ts';

const NEWEST = 359;
const START = '2001-09';

/** What two decimals of four levels above 20 can make of a difference in log points. */
const ROUNDING = 0.1;

describe.each(demoEconomies)('the files of $name', (economy) => {
  const data = demoData(economy, START);
  const vintages = [355, 356, 357, 358, 359].map((position) => data.vintage(position));

  test('are the same bytes whenever they are made', () => {
    expect(vintageCsv(demoData(economy, START).vintage(NEWEST), START)).toBe(
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
  const data = demoData(aldermark, START);
  const firsts = Array.from({ length: 24 }, (_, i) => data.vintage(336 + i).prices[0]);
  expect(firsts.filter((level, i) => i > 0 && level !== firsts[i - 1])).toHaveLength(1);
});

describe('the seasons of Farrowland', () => {
  const farrowland = demoEconomies.find(({ code }) => code === 'XFA')!;
  const truth = farrowland.truth as ModelTruth;
  const seasons = truth.seasons!;
  const adjusted = demoData({ ...farrowland, truth: { ...truth, seasons: undefined } }, START);

  /** How much log points of a level change from position to position, by the two forms of the same data. */
  const added = (name: 'money' | 'prices' | 'activity', start: string) => {
    const points = (data: DemoData) =>
      data.vintage(NEWEST)[name].map((level) => 100 * Math.log(Number(level)));
    const [plain, seasonal] = [points(adjusted), points(demoData(farrowland, start))];
    return plain.map((value, position) => seasonal[position]! - value);
  };

  test.each([START, '2002-01', '1999-12'])('follow the calendar from %s on', (start) => {
    const month = (position: number) => Number(addPeriods(start, position).slice(5)) - 1;
    for (const name of ['money', 'prices'] as const) {
      const levels = added(name, start);
      for (let position = 1; position <= NEWEST; position++) {
        const growth = levels[position]! - levels[position - 1]!;
        expect(Math.abs(growth - seasons[name][month(position)]!)).toBeLessThan(ROUNDING);
      }
    }
    const levels = added('activity', start);
    for (let position = 1; position <= NEWEST; position++) {
      const expected = seasons.activity[month(position)]! - seasons.activity[month(0)]!;
      expect(Math.abs(levels[position]! - levels[0]! - expected)).toBeLessThan(ROUNDING);
    }
  });

  test('take nothing away over a year and are described as left in', () => {
    for (const pattern of Object.values(seasons) as number[][]) {
      expect(pattern).toHaveLength(12);
      expect(pattern.reduce((sum, value) => sum + value, 0)).toBeCloseTo(0, 12);
    }
    for (const { code, series } of demoEconomies) {
      const expected = code === 'XFA' ? 'unadjusted' : 'adjusted';
      for (const { adjustment } of Object.values(series)) expect(adjustment).toBe(expected);
    }
  });

  test('change nothing else: errors of first figures stay where they were', () => {
    expect(demoData(farrowland, '2002-01').truth).toEqual(adjusted.truth);
  });
});
