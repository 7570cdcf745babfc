import * as Plot from '@observablehq/plot';
import type { Values } from '../econ/types.ts';
import { spanLabel, tickRoom, tickStep, valueTicks } from './axes.ts';
import { accountingFigure, withUnit } from './figures.ts';
import { hatchPattern, partMarks, stackParts, partNames } from './inflationParts.ts';
import type { InflationData, PartName } from './inflationParts.ts';
import {
  inflationLabels,
  leaderPaths,
  leaderRoom,
  nameRoom,
  periodLabels,
} from './inflationLabels.ts';
import { baselineAt } from './labels.ts';
import type { Label } from './labels.ts';
import { pathMark } from './panel.ts';
import { periodLabel } from './periodLabels.ts';
import { drawSvg } from './svg.ts';
import type { Chart, ChartOptions } from './svg.ts';

export interface InflationChartOptions extends ChartOptions {
  data: InflationData;
  /** How many of the last periods to show; 13 unless given. */
  count?: number;
}

/** Below this width the parts' names do not fit beside the last column: the page's list of parts names them. */
const namedFrom = 560;

/**
 * Inflation and the parts the model assigns to it, stacked from the datum: expected money less trend, the period's
 * surprise, carry-over and what is unexplained, with inflation itself as a mark. Log points.
 */
export function inflationChart(options: InflationChartOptions): Chart {
  const { width, palette, idPrefix } = options;
  const shown = lastPeriods(options.data, options.count ?? 13);
  const { periods, inflation } = shown;
  const parts = stackParts(inflation);
  const ends = parts.flatMap(({ from, to }) => [from, to]);
  const { low, high, step } = valueRange([...ends, ...inflation.actual]);
  const ticks = valueTicks(low, high, step, options);
  const narrow = width < namedFrom;
  const left = tickRoom(ticks);
  const right = width - (narrow ? 0 : nameRoom(shown, options));
  const top = 24.5;
  const pixels = (narrow ? 200 : 320) / (high - low);
  const datumY = Math.round(top + high * pixels) + 0.5;
  const bottom = datumY - low * pixels;
  const height = Math.ceil(bottom) + 48;
  const y = (value: number) => datumY - value * pixels;
  const column = (right - left) / Math.max(periods.length, 1);
  const x = (index: number) => left + index * column;
  const hatch = `${idPrefix}-hatch`;
  const names = narrow ? [] : inflationLabels(shown, parts, { x: right + leaderRoom, y, options });
  const labels: Label[] = [
    ...ticks.map(({ value, label }): Label => {
      return {
        text: label,
        x: left - 10,
        y: baselineAt(y(value)),
        fill: palette.ink2,
        anchor: 'end',
      };
    }),
    ...periodLabels(periods, column, { x, y: bottom + 28, fill: palette.ink2 }),
    ...names.flatMap(({ labels }) => labels),
  ];
  const leaders = leaderPaths(names, right);
  const svg = drawSvg({
    chart: options,
    height,
    label: describe(options, shown),
    x: { type: 'linear', domain: [0, Math.max(periods.length, 1)], range: [left, right] },
    y: { type: 'linear', domain: [low, high], range: [bottom, datumY - high * pixels] },
    marks: [
      Plot.ruleY(ticks, {
        y: 'value',
        x1: 0,
        x2: Math.max(periods.length, 1),
        stroke: palette.rule,
      }),
      ...partMarks(parts, palette, `url(#${hatch})`),
      Plot.ruleY([0], { stroke: palette.ink }),
      ...inflationMarks(inflation.actual, options),
      ...(leaders === '' ? [] : [pathMark(leaders, palette.rule2)]),
    ],
    labels,
    defs: hatchPattern(hatch, palette),
  });
  return { svg, width, height, datumY };
}

function lastPeriods({ periods, inflation }: InflationData, count: number): InflationData {
  const from = Math.max(0, periods.length - Math.max(count, 1));
  const cut = (values: Values) => values.slice(from);
  return {
    periods: periods.slice(from),
    inflation: {
      actual: cut(inflation.actual),
      expected_money: cut(inflation.expected_money),
      current_surprise: cut(inflation.current_surprise),
      carry_over: cut(inflation.carry_over),
      unexplained: cut(inflation.unexplained),
    },
  };
}

/** A scale of whole ticks that holds every value, with the datum on it and not at its very end. */
function valueRange(values: Values): { low: number; high: number; step: number } {
  const finite = values.filter(
    (value): value is number => value !== null && Number.isFinite(value),
  );
  const lowest = Math.min(0, ...finite);
  const highest = Math.max(0, ...finite);
  if (highest - lowest < 0.01) return { low: -0.5, high: 0.5, step: 0.5 };
  const step = tickStep(highest - lowest, 6);
  return { low: Math.min(lowest, -step / 2), high: Math.max(highest, step / 2), step };
}

/** Inflation itself: a 3 px mark a little wider than the column, on a halo of paper. */
function inflationMarks(actual: Values, { palette }: ChartOptions): Plot.Markish[] {
  const marks = actual.flatMap((value, i) =>
    value === null ? [] : [{ x1: i + 0.1, x2: i + 0.9, value }],
  );
  const place = { y: 'value', x1: 'x1', x2: 'x2' } as const;
  return [
    Plot.ruleY(marks, { ...place, stroke: palette.paper, strokeWidth: 7 }),
    Plot.ruleY(marks, { ...place, stroke: palette.ink, strokeWidth: 3 }),
  ];
}

function describe(options: InflationChartOptions, { periods, inflation }: InflationData): string {
  const last = inflation.actual.findLastIndex((value) => value !== null);
  const title = `Inflation and its parts, log points, ${spanLabel(periods)}`;
  if (last < 0) return `${title}: no values.`;
  const figure = (value: number | null | undefined) =>
    withUnit(accountingFigure(value ?? null, options), 'pp');
  const names = partNames(periods[last]!);
  const parts = (Object.keys(names) as PartName[])
    .filter((name) => inflation[name][last] !== null)
    .map((name) => `${names[name].toLowerCase()} ${figure(inflation[name][last])}`);
  return (
    `${title}. ${periodLabel(periods[last]!)}: inflation ${figure(inflation.actual[last])}; ` +
    `${parts.join(', ')}.`
  );
}
