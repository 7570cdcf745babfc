import { type GaugeScale, gaugeScale } from '../../lib/charts/gauge.ts';
import { addPeriods, periodsFrom } from '../../lib/econ/periods.ts';
import type { Column } from './load.ts';

/** A row of gauges on one scale: columns that are out from the highest to the lowest, then the others by due date. */
export interface Arrangement {
  scale: GaugeScale;
  columns: Column[];
}

/** The latest history of a column up to its own period, `count` periods of it, in pp and in standard deviations. */
export function historyOf({ release }: Column, count: number) {
  const result = release?.result;
  const end = result ? result.periods.indexOf(release.period) + 1 : 0;
  const cut = <T>(values: T[] | undefined) => values?.slice(Math.max(0, end - count), end) ?? [];
  return {
    periods: cut(result?.periods),
    surprise: cut<number | null>(result?.surprise),
    forecast_se: cut(result?.forecast_se),
    standardised_surprise: cut(result?.standardised_surprise),
  };
}

/** The surprises of the `count` periods up to `month`; null where a period is not out. */
export function surprisesTo(column: Column, month: string, count: number) {
  const { periods, surprise } = historyOf(column, count);
  const known = new Map(periods.map((period, i) => [period, surprise[i] ?? null]));
  const shown = periodsFrom(addPeriods(month, 1 - count), count, 'monthly');
  return { periods: shown, surprise: shown.map((period) => known.get(period) ?? null) };
}

/** Orders the columns of a month and finds the scale they share. */
export function arrange(columns: Column[]): Arrangement {
  const out = columns.filter(({ isOut }) => isOut);
  const scale = gaugeScale(out.map((column) => historyOf(column, 13)));
  const shown = ({ reading }: Column) =>
    (scale.unit === 'pp' ? reading?.surprise : reading?.standardised) ?? -Infinity;
  const dueAt = ({ due }: Column) => due?.dueAt.getTime() ?? Infinity;
  return {
    scale,
    columns: [
      ...[...out].sort((a, b) => shown(b) - shown(a)),
      ...columns.filter(({ isOut }) => !isOut).sort((a, b) => (dueAt(a) < dueAt(b) ? -1 : 1)),
    ],
  };
}
