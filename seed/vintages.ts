import exp from '@stdlib/math-base-special-exp';
import { addPeriods } from '../src/lib/econ/periods.ts';
import type { DemoEconomy } from './economy.ts';
import { type TrueHistory, generate } from './generate.ts';
import { withSeasons } from './seasons.ts';

/** What is left of a first figure's error a month later; after that the figure is right. */
const ERROR_LEFT = 0.4;

/** The twelve positions whose mean index is 100, before and after prices are rebased. */
const FIRST_BASE = 240;
const SECOND_BASE = 324;
const BASE_MONTHS = 12;

/** One economy's file as its statistical office would send it after a month: the digits of each level. */
export interface DemoVintage {
  money: string[];
  prices: string[];
  activity: string[];
}

/** An economy's truth, and every file that was ever published about it. */
export interface DemoData {
  truth: TrueHistory;
  /** What was known when the month at `position` came out: that month and all before it. */
  vintage(position: number): DemoVintage;
}

/**
 * The data of an economy whose first month is `start`. Values depend on its seed and the position alone, never on a
 * date; but seasons follow the calendar, so where figures are not adjusted `start` decides which month has which.
 */
export function demoData(economy: DemoEconomy, start: string): DemoData {
  const truth = generate(economy);
  const levels = withSeasons(economy.truth, truth, start);
  const money = levels.money.map((value) => value - levels.money[0]!);
  const prices = indexed(levels.prices, FIRST_BASE);
  const rebased = indexed(levels.prices, SECOND_BASE);
  const activity = indexed(levels.activity, FIRST_BASE);
  return {
    truth,
    vintage(position) {
      const months = position + 1;
      const rebasedFrom = economy.pricesRebasedFrom ?? Infinity;
      return {
        money: money.slice(0, months).map((value, month) => {
          const level = value + (truth.firstError[month] ?? 0) * errorLeft(position - month);
          return published(economy.firstMoney * exp(level / 100));
        }),
        prices: (position >= rebasedFrom ? rebased : prices).slice(0, months).map(published),
        activity: activity.slice(0, months).map(published),
      };
    },
  };
}

/** A vintage as a CSV file of the desk's form, its first month being `firstMonth`. */
export function vintageCsv(vintage: DemoVintage, firstMonth: string): string {
  const rows = vintage.money.map((money, month) =>
    [addPeriods(firstMonth, month), money, vintage.prices[month], vintage.activity[month]].join(),
  );
  return ['period,money,prices,activity', ...rows, ''].join('\n');
}

function errorLeft(age: number): number {
  if (age === 0) return 1;
  return age === 1 ? ERROR_LEFT : 0;
}

/** Levels whose mean over the twelve months from `base` on is 100. */
function indexed(logPoints: number[], base: number): number[] {
  const levels = logPoints.map((value) => exp(value / 100));
  const mean =
    levels.slice(base, base + BASE_MONTHS).reduce((sum, level) => sum + level, 0) / BASE_MONTHS;
  return levels.map((level) => (100 * level) / mean);
}

/** Two decimals, and more where a level is so small that two would not leave four digits. */
function published(level: number): string {
  let decimals = 2;
  for (let least = 10; level < least && decimals < 8; least /= 10) decimals++;
  return level.toFixed(decimals);
}
