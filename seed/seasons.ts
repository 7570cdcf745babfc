import type { ModelTruth, StickyTruth } from './economy.ts';
import type { TrueHistory } from './generate.ts';

type Levels = Pick<TrueHistory, 'money' | 'prices' | 'activity'>;

/**
 * The history as its figures show it, in log points. Seasons belong to months of the year, so the first month's is
 * the one thing of the calendar that data depend on; all else depends on the seed and the position.
 */
export function withSeasons(
  { seasons }: Pick<ModelTruth, 'seasons'> | (StickyTruth & { seasons?: undefined }),
  history: Levels,
  start: string,
): Levels {
  if (!seasons) return history;
  const first = Number(start.slice(5, 7)) - 1;
  const level = (values: number[], pattern: number[]) =>
    values.map((value, position) => value + pattern[(first + position) % 12]!);
  const growth = (values: number[], pattern: number[]) => {
    let added = 0;
    return values.map((value, position) => {
      if (position > 0) added += pattern[(first + position) % 12]!;
      return value + added;
    });
  };
  return {
    money: growth(history.money, seasons.money),
    prices: growth(history.prices, seasons.prices),
    activity: level(history.activity, seasons.activity),
  };
}
