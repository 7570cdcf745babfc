import * as Plot from '@observablehq/plot';
import type { Values } from '../econ/types.ts';
import { tickStep, valueTicks } from './axes.ts';
import { minus, side, standardisedFigure, surpriseFigure, withUnit } from './figures.ts';
import type { Side } from './figures.ts';
import { baselineAt } from './labels.ts';
import type { Label } from './labels.ts';
import { pathMark } from './panel.ts';
import { escape, drawSvg } from './svg.ts';
import type { Chart, ChartOptions } from './svg.ts';

export type GaugeUnit = 'pp' | 's.d.';

/** The scale that all gauges of one row share. */
export interface GaugeScale {
  unit: GaugeUnit;
  /** Half its height, in `unit`. */
  domain: number;
}

/** Arrays over consecutive periods of which the last is the one shown; a whole result fits. */
export interface GaugeHistory {
  /** Log points. */
  surprise: Values;
  /** Log points. */
  forecast_se: Values;
  standardised_surprise: Values;
}

export interface GaugeData {
  economy: string;
  /** The period as readers see it. */
  periodLabel: string;
  /** Null where the period is not out: the scale stays empty. */
  history: GaugeHistory | null;
}

export interface GaugeOptions extends ChartOptions {
  data: GaugeData;
  scale: GaugeScale;
  /** Height of the scale; 376 px unless given. */
  scaleHeight?: number;
  /** Whether the ticks are labelled, in the 44 px left of the scale: for the first gauge of a row without a key. */
  labelled?: boolean;
}

/**
 * The scale for a row of gauges that show the last thirteen periods of each history: in standard deviations where
 * the largest surprise exceeds four times the median forecast standard error, so that one economy cannot flatten the others.
 */
export function gaugeScale(histories: GaugeHistory[]): GaugeScale {
  const shown = (values: Values) => finite(values.slice(-13));
  const surprises = histories.flatMap(({ surprise }) => shown(surprise)).map(Math.abs);
  const errors = histories.flatMap(({ forecast_se }) => finite(forecast_se.slice(-1)));
  const largest = Math.max(0, ...surprises);
  if (errors.length > 0 && largest > 4 * median(errors)) {
    const standardised = histories.flatMap((history) => shown(history.standardised_surprise));
    return { unit: 's.d.', domain: upToQuarter(Math.max(1, ...standardised.map(Math.abs))) };
  }
  return { unit: 'pp', domain: upToQuarter(Math.max(largest, ...errors)) };
}

function finite(values: Values): number[] {
  return values.filter((value): value is number => value !== null && Number.isFinite(value));
}

function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length / 2;
  return (sorted[Math.ceil(middle) - 1]! + sorted[Math.floor(middle)]!) / 2;
}

/** The next quarter above `value`, at least one. */
function upToQuarter(value: number): number {
  return Math.max(0.25, Math.ceil(value * 4 + 0.2) / 4);
}

const scaleLeft = 9;
const rangeWidth = 20;
const barWidth = 10;
const serif = 'Merriweather, serif';

/** One economy's surprise as a gauge: scale, typical range, bar with cap, the twelve periods before, and its figure. */
export function gauge(options: GaugeOptions): Chart {
  const { data, scale, width, palette, scaleHeight = 376, labelled = false } = options;
  const left = labelled ? scaleLeft + 44 : scaleLeft;
  const frame = gaugeFrame(scale, scaleHeight);
  const { y, datumY, height } = frame;
  const reading = read(data.history, scale);
  const colour = reading.side === 'level' ? palette.ink : palette[reading.side];
  const text = reading.value === null ? '' : figure(reading.value, options);
  // By the scale's end, so that all figures of a row have one size.
  const size = figureSize(figure(scale.domain, options), width - left);
  const labels: Label[] = labelled ? tickLabels(options, scale, left - scaleLeft - 4, y) : [];
  const svg = drawSvg({
    chart: options,
    height,
    label: describe(options, reading),
    x: { type: 'identity' },
    y: { type: 'linear', domain: [-scale.domain, scale.domain], range: [frame.bottom, frame.top] },
    marks: [
      ...typicalMarks(reading.typical, left, options),
      pathMark(scalePath(scale, left, frame), palette.rule2),
      ...previousMarks(reading.previous, left, options),
      Plot.ruleY([0], { stroke: palette.ink }),
      ...(reading.value === null ? [] : [needle(y(reading.value), datumY, left, colour)]),
    ],
    labels,
    over:
      size === null || reading.value === null
        ? ''
        : figureText(text, reading.value, { x: left + figureLeft, size, fill: colour }, frame),
  });
  return { svg, width, height, datumY };
}

interface Reading {
  /** In the scale's unit. */
  value: number | null;
  side: Side;
  /** Half the typical range: the forecast standard error, or one standard deviation. */
  typical: number | null;
  previous: number[];
}

function read(history: GaugeHistory | null, { unit }: GaugeScale): Reading {
  if (history === null) return { value: null, side: 'level', typical: null, previous: [] };
  const values = unit === 'pp' ? history.surprise : history.standardised_surprise;
  const value = values.at(-1) ?? null;
  const error = history.forecast_se.at(-1) ?? null;
  return {
    value,
    side: side(history.surprise.at(-1)),
    typical: unit === 'pp' || error === null ? error : 1,
    previous: finite(values.slice(-13, -1)),
  };
}

export interface GaugeFrame {
  top: number;
  bottom: number;
  height: number;
  datumY: number;
  y: (value: number) => number;
}

/** Heights that every gauge of one scale shares. */
export function gaugeFrame(scale: GaugeScale, scaleHeight: number): GaugeFrame {
  const half = Math.floor(scaleHeight / 2);
  const datumY = half + 8.5;
  return {
    top: datumY - half,
    bottom: datumY + half,
    height: 2 * half + 17,
    datumY,
    y: (value) => datumY - (value / scale.domain) * half,
  };
}

/** The step of a gauge's ticks: a quarter, unless the scale is too tall for that many. */
function gaugeStep({ domain }: GaugeScale): number {
  return domain <= 2.5 ? 0.25 : tickStep(domain, 8);
}

/** The scale's line with its ticks to the left, longer where they may be labelled. */
export function scalePath(scale: GaugeScale, left: number, { top, bottom, y }: GaugeFrame): string {
  const step = gaugeStep(scale);
  const count = Math.floor(scale.domain / step + 1e-9);
  let path = `M${left + 0.5},${top}V${bottom}`;
  for (let i = -count; i <= count; i += 1) {
    if (i !== 0) path += `M${left},${y(i * step)}h${i % 2 === 0 ? -9 : -5}`;
  }
  return path;
}

/** Labels of every second tick, right-aligned at `x`; the uppermost names the unit. */
export function tickLabels(
  options: ChartOptions,
  scale: GaugeScale,
  x: number,
  y: (value: number) => number,
): Label[] {
  const ticks = valueTicks(-scale.domain, scale.domain, 2 * gaugeStep(scale), options);
  return ticks.map(({ value, label }, i) => {
    const text = i === ticks.length - 1 ? withUnit(label, scale.unit) : label;
    return { text, x, y: baselineAt(y(value)), fill: options.palette.ink2, anchor: 'end' };
  });
}

export function typicalMarks(
  typical: number | null,
  left: number,
  { palette }: ChartOptions,
): Plot.Markish[] {
  if (typical === null) return [];
  const place = { x1: left + 1, x2: left + 1 + rangeWidth };
  return [
    Plot.rect([typical], { ...place, y1: -typical, y2: typical, fill: palette.range }),
    Plot.ruleY([-typical, typical], { ...place, stroke: palette.rule2 }),
  ];
}

export function previousMarks(
  values: number[],
  left: number,
  { palette }: ChartOptions,
): Plot.Markish[] {
  const x1 = left + rangeWidth + 5;
  return [Plot.ruleY(values, { x1, x2: x1 + 8, stroke: palette.ink3 })];
}

/** The bar from the datum with a cap that also shows where it has no length. */
export function needle(tip: number, datumY: number, left: number, colour: string): Plot.Markish {
  const middle = left + 1 + rangeWidth / 2;
  return (_index, _scales, _values, _dimensions, context) => {
    const path = context.document.createElementNS('http://www.w3.org/2000/svg', 'path');
    const bar = `M${middle - barWidth / 2},${datumY}V${tip}h${barWidth}V${datumY}Z`;
    const inwards = tip <= datumY ? 2.5 : -2.5;
    path.setAttribute('d', `${bar}M${middle - 8},${tip}h16v${inwards}h-16Z`);
    path.setAttribute('fill', colour);
    return path;
  };
}

/** Room for the scale, the range and the previous periods before the figure, in px. */
const figureLeft = 43;

/** Widest that Merriweather's signs and figures are on average, in em. */
const figureAdvance = 0.6;

/** Type size of the figure beside the cap, or none where the column is too narrow and the page prints it. */
function figureSize(text: string, room: number): number | null {
  const fits = (size: number) => figureLeft + figureAdvance * size * text.length <= room;
  return [38, 32, 26, 22].find(fits) ?? null;
}

function figure(value: number, { scale, decimalMark }: GaugeOptions): string {
  const print = scale.unit === 'pp' ? surpriseFigure : standardisedFigure;
  return print(value, decimalMark === undefined ? {} : { decimalMark });
}

/** The figure beside the cap; never across the datum, and inside the chart. */
function figureText(
  text: string,
  value: number,
  { x, size, fill }: { x: number; size: number; fill: string },
  { datumY, height, y }: GaugeFrame,
): string {
  const capHeight = 0.75 * size;
  const centre = y(value) + capHeight / 2;
  const baseline = text.startsWith(minus)
    ? Math.min(Math.max(centre, datumY + 8 + capHeight), height - 2)
    : Math.max(Math.min(centre, datumY - 8), capHeight + 1);
  return (
    `<text x="${x}" y="${Math.round(baseline * 100) / 100}" fill="${fill}" font-family="${serif}" ` +
    `font-size="${size}" font-weight="300">${escape(text)}</text>`
  );
}

function describe(options: GaugeOptions, reading: Reading): string {
  const { data, scale } = options;
  const title = `${data.economy}, ${data.periodLabel}: money surprise`;
  if (reading.value === null) return `${title} not yet published.`;
  const relation = reading.side === 'level' ? 'level' : `${reading.side} expectation`;
  const value = withUnit(figure(reading.value, options), scale.unit);
  if (reading.typical === null) return `${title} ${value}, ${relation}.`;
  const typical = withUnit(figure(reading.typical, options).replace('+', '±'), scale.unit);
  return `${title} ${value}, ${relation}; typical range ${typical}.`;
}
