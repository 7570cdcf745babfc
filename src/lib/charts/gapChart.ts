import * as Plot from '@observablehq/plot';
import { periodsShown, spanLabel, symmetricDomain } from './axes.ts';
import { gapFigure, range, side, withUnit } from './figures.ts';
import { gapLines } from './gapLines.ts';
import type { GapData } from './gapLines.ts';
import { baselineAt, spread, valueSize } from './labels.ts';
import type { Label } from './labels.ts';
import { axisLabels, datumMarks, gridMarks, panel, panelScales, pathMark } from './panel.ts';
import type { Panel } from './panel.ts';
import { periodLabel, periodNoun } from './periodLabels.ts';
import { drawSvg } from './svg.ts';
import type { Chart, ChartOptions } from './svg.ts';
import { textWidth } from './textWidth.ts';

export interface GapChartOptions extends ChartOptions {
  data: GapData;
  /** Whether the specification has persistence; without it what is drawn is not called a gap. */
  persistent: boolean;
  /** Whether neutrality is rejected at 1%: the line is then dashed and has no band. */
  rejected: boolean;
  /** The band's confidence, 0 to 1; 0.8 unless given. */
  confidence?: number;
  /** How many of the last periods to show; as many whole years as the width holds, unless given. */
  count?: number;
  /** Half the height of the scale, in per cent. */
  domain?: number;
}

/** Between the plot and its last value: the bracket. */
const bracketRoom = 12;

/** Room right of the plot for the last value and the band's ends, in px. */
function lastRoom(last: LastGap | null, options: GapChartOptions): number {
  const text = withUnit(gapFigure(last?.value, options), '%');
  return Math.max(78, bracketRoom + Math.ceil(textWidth(text, valueSize, 600)));
}

/** The last periods of `data` that a chart of `width` px shows; nothing where no gap is published. */
export function shownGaps(data: GapData, width: number, count?: number): GapData {
  const shown = count ?? periodsShown(data.periods, width);
  const from = Math.max(0, data.periods.length - Math.max(shown, 1));
  return {
    periods: data.periods.slice(from),
    gap: data.gap?.slice(from) ?? null,
    gap_lower: data.gap_lower?.slice(from) ?? null,
    gap_upper: data.gap_upper?.slice(from) ?? null,
  };
}

/** Half the height of the scale that holds the gaps shown and, unless it is `rejected`, their band, in per cent. */
export function gapDomain({ gap, gap_lower, gap_upper }: GapData, rejected: boolean): number {
  const band = rejected ? [] : [...(gap_lower ?? []), ...(gap_upper ?? [])];
  return symmetricDomain([...(gap ?? []), ...band]);
}

/**
 * Output relative to trend as a line coloured by side with its band, and the last value with both ends.
 * Per cent of output; null where there is no value.
 */
export function gapChart(options: GapChartOptions): Chart {
  const { data, width, palette, rejected } = options;
  const shown = shownGaps(data, width, options.count);
  const domain = options.domain ?? gapDomain(shown, rejected);
  const last = lastGap(shown);
  const marginRight = lastRoom(last, options);
  const area = panel({ chart: options, periods: shown.periods, domain, marginRight });
  const { band, pieces } = gapLines(shown, palette);
  const edge = { x: 'x', z: 'run', stroke: palette.rule2, strokeWidth: 1 } as const;
  const marks: Plot.Markish[] = [
    ...(rejected
      ? []
      : [
          Plot.areaY(band, { x: 'x', y1: 'lower', y2: 'upper', z: 'run', fill: palette.range }),
          Plot.line(band, { ...edge, y: 'lower' }),
          Plot.line(band, { ...edge, y: 'upper' }),
        ]),
    ...gridMarks(area),
    ...datumMarks(area),
    Plot.line(pieces, {
      x: 'x',
      y: 'value',
      z: 'piece',
      stroke: 'stroke',
      strokeWidth: 2,
      strokeLinejoin: 'round',
      ...(rejected ? { strokeDasharray: '5 3' } : {}),
    }),
    ...(last === null ? [] : lastMarks(area, last, options)),
  ];
  const svg = drawSvg({
    chart: options,
    height: area.height,
    label: describe(options, shown, last),
    ...panelScales(area, domain),
    marks,
    labels: [...axisLabels(area), ...(last === null ? [] : lastLabels(area, last, options))],
  });
  return { svg, width, height: area.height, datumY: area.datumY };
}

interface LastGap {
  index: number;
  value: number;
  /** Ends of the band, or null where there is none. */
  band: [number, number] | null;
}

function lastGap({ gap, gap_lower, gap_upper }: GapData): LastGap | null {
  const index = gap?.findLastIndex((value) => value !== null) ?? -1;
  const value = gap?.[index] ?? null;
  if (value === null) return null;
  const lower = gap_lower?.[index] ?? null;
  const upper = gap_upper?.[index] ?? null;
  return { index, value, band: lower === null || upper === null ? null : [lower, upper] };
}

function sideColour(value: number, { palette }: ChartOptions): string {
  const where = side(value);
  return where === 'level' ? palette.ink : palette[where];
}

function lastMarks(area: Panel, last: LastGap, options: GapChartOptions): Plot.Markish[] {
  const dot = Plot.dot([last], {
    x: last.index + 0.5,
    y: 'value',
    r: 4,
    fill: sideColour(last.value, options),
  });
  if (options.rejected || last.band === null) return [dot];
  const [lower, upper] = last.band.map(area.y);
  const x = area.right + 4;
  return [dot, pathMark(`M${x - 4},${upper!}H${x}V${lower!}H${x - 4}`, options.palette.rule2)];
}

function lastLabels(area: Panel, last: LastGap, options: GapChartOptions): Label[] {
  const x = area.right + bracketRoom;
  const { ink2 } = options.palette;
  const value: Label = {
    text: withUnit(gapFigure(last.value, options), '%'),
    x,
    y: 0,
    fill: sideColour(last.value, options),
    size: valueSize,
    weight: 600,
  };
  if (options.rejected) {
    const centre = area.y(last.value);
    const clear =
      last.value < 0 ? Math.max(centre, area.datumY + 10) : Math.min(centre, area.datumY - 27);
    value.y = baselineAt(clear, valueSize);
    return [value, { text: 'assumed', x, y: value.y + 17, fill: ink2 }];
  }
  if (last.band === null) {
    const [centre] = clearOfDatum(area, [last.value]);
    return [{ ...value, y: baselineAt(centre!, valueSize) }];
  }
  const [lower, upper] = last.band;
  const centres = clearOfDatum(area, [upper, last.value, lower]);
  return [
    { text: gapFigure(upper, options), x, y: baselineAt(centres[0]!), fill: ink2 },
    { ...value, y: baselineAt(centres[1]!, valueSize) },
    { text: gapFigure(lower, options), x, y: baselineAt(centres[2]!), fill: ink2 },
  ];
}

/** Centres of labels for `values` (descending), apart from each other and never across the datum. */
function clearOfDatum(area: Panel, values: number[]): number[] {
  const gap = 19;
  const above = spread(values.filter((value) => value >= 0).map(area.y), gap);
  const below = spread(values.filter((value) => value < 0).map(area.y), gap);
  const up = Math.max(0, Math.max(...above) - (area.datumY - 10));
  const down = Math.max(0, area.datumY + 10 - Math.min(...below));
  return [...above.map((centre) => centre - up), ...below.map((centre) => centre + down)];
}

function describe(options: GapChartOptions, shown: GapData, last: LastGap | null): string {
  const { periods } = shown;
  const noun = periods[0] === undefined ? 'month' : periodNoun(periods[0]);
  const name = options.persistent
    ? 'Implied output gap, per cent of trend output'
    : `Same-${noun} output effect of the surprise, per cent of output`;
  if (last === null) return `${name}, ${spanLabel(periods)}: no values.`;
  const where = side(last.value);
  const relation =
    where === 'level' ? 'level' : options.persistent ? `${where} trend` : `${where} zero`;
  const figure = withUnit(gapFigure(last.value, options), '%');
  const sentences = [
    `${name}, ${spanLabel(periods)}.`,
    `Latest: ${figure} in ${periodLabel(periods[last.index]!)}, ${relation}.`,
  ];
  if (options.rejected) {
    sentences.push('Drawn dashed and without a band: an assumption, not an estimate.');
  } else if (last.band !== null) {
    const confidence = Math.round(100 * (options.confidence ?? 0.8));
    sentences.push(`${confidence}% band ${withUnit(range(...last.band, 1, options), '%')}.`);
  }
  return sentences.join(' ');
}
