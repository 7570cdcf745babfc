import * as Plot from '@observablehq/plot';
import { symmetricDomain, tickRoom, tickStep, valueTicks, yearTicks } from './axes.ts';
import type { ValueTick, YearTick } from './axes.ts';
import { baselineAt, labelBox } from './labels.ts';
import type { Label } from './labels.ts';
import { parsePeriod } from '../econ/periods.ts';
import { periodLabel } from './periodLabels.ts';
import type { ChartOptions } from './svg.ts';

/** Below this width labels move from the right margin into the plot. */
export const narrowBelow = 480;

/** Where everything of a chart over time lies, in px. */
export interface Panel {
  chart: ChartOptions;
  periods: string[];
  left: number;
  right: number;
  top: number;
  bottom: number;
  height: number;
  datumY: number;
  step: number;
  ticks: ValueTick[];
  years: YearTick[];
  /** Left edge of the period with that index; its middle is at index + .5. */
  x: (index: number) => number;
  y: (value: number) => number;
}

export interface PanelOptions {
  chart: ChartOptions;
  periods: string[];
  /** Half the height of the symmetric scale. */
  domain: number;
  /** Room right of the plot. */
  marginRight: number;
  /** Room above the plot. */
  marginTop?: number;
}

export function plotHeight(width: number): number {
  return width < narrowBelow ? 264 : 366;
}

export function panelTicks(domain: number, chart: ChartOptions): ValueTick[] {
  const half = symmetricDomain([domain]);
  return valueTicks(-domain, domain, tickStep(half, 4), chart);
}

/** A panel with a symmetric scale: equal widths and domains give equal pixels per unit and one datum. */
export function panel({
  chart,
  periods,
  domain,
  marginRight,
  marginTop = 24,
}: PanelOptions): Panel {
  const ticks = panelTicks(domain, chart);
  const left = tickRoom(ticks);
  const right = chart.width - marginRight;
  const half = plotHeight(chart.width) / 2;
  const datumY = marginTop + half + 0.5;
  const step = (right - left) / Math.max(periods.length, 1);
  return {
    chart,
    periods,
    left,
    right,
    top: datumY - half,
    bottom: datumY + half,
    height: marginTop + 2 * half + 44,
    datumY,
    step,
    ticks,
    years: yearTicks(periods, step),
    x: (index) => left + index * step,
    y: (value) => datumY - (value / domain) * half,
  };
}

/** Plot's scales for a panel: x counts periods, y is in the values' unit. */
export function panelScales(
  panel: Panel,
  domain: number,
): { x: Plot.ScaleOptions; y: Plot.ScaleOptions } {
  const { periods, left, right, top, bottom } = panel;
  return {
    x: { type: 'linear', domain: [0, Math.max(periods.length, 1)], range: [left, right] },
    y: { type: 'linear', domain: [-domain, domain], range: [bottom, top] },
  };
}

/** Gridlines, which stop at the plot's edges. */
export function gridMarks(panel: Panel): Plot.Markish[] {
  const { chart, ticks, periods } = panel;
  return [
    Plot.ruleY(ticks, {
      y: 'value',
      x1: 0,
      x2: Math.max(periods.length, 1),
      stroke: chart.palette.rule,
    }),
  ];
}

/** The datum from edge to edge with its year ticks: drawn last, so that nothing covers it. */
export function datumMarks(panel: Panel): Plot.Markish[] {
  const { chart, years, datumY, x, step } = panel;
  const { ink } = chart.palette;
  const ticks = years.map(({ index }) => `M${tickX(panel, index, x, step)},${datumY}v5`).join('');
  return [Plot.ruleY([0], { stroke: ink }), ...(ticks === '' ? [] : [pathMark(ticks, ink)])];
}

function tickX(panel: Panel, index: number, x: Panel['x'], step: number): number {
  return x(index) + (isAnnual(panel.periods) ? step / 2 : 0);
}

function isAnnual(periods: string[]): boolean {
  return periods[0] !== undefined && parsePeriod(periods[0]).frequency === 'annual';
}

/** A path at coordinates in px, for what no scale places. */
export function pathMark(d: string, stroke: string): Plot.Markish {
  return (_index, _scales, _values, _dimensions, context) => {
    const path = context.document.createElementNS('http://www.w3.org/2000/svg', 'path');
    path.setAttribute('d', d);
    path.setAttribute('fill', 'none');
    path.setAttribute('stroke', stroke);
    return path;
  };
}

/** Labels of the axes: values at the left, years below. */
export function axisLabels(panel: Panel): Label[] {
  const { chart, ticks, years, left, bottom, x, y, step, periods } = panel;
  const fill = chart.palette.ink2;
  const values = ticks.map(({ value, label }): Label => {
    return { text: label, x: left - 10, y: baselineAt(y(value)), fill, anchor: 'end' };
  });
  const below = bottom + 33;
  const annual = isAnnual(periods);
  const yearLabels = years
    .map(({ index, year }): Label => {
      const anchor = annual ? 'middle' : 'start';
      return { text: year, x: tickX(panel, index, x, step), y: below, fill, anchor };
    })
    .filter((label) => labelBox(label).right <= chart.width);
  if (yearLabels.length === 0 && periods[0] !== undefined) {
    yearLabels.push({ text: periodLabel(periods[0], 'short'), x: left, y: below, fill });
  }
  return [...values, ...yearLabels];
}
