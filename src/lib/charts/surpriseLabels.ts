import { side, surpriseFigure, withUnit } from './figures.ts';
import { labelBox, overlap, valueSize } from './labels.ts';
import type { Box, Label } from './labels.ts';
import type { Panel } from './panel.ts';
import { periodLabel, periodNoun } from './periodLabels.ts';
import type { SurpriseData } from './surpriseData.ts';
import type { ChartOptions } from './svg.ts';
import { barShare } from './surpriseMarks.ts';
import { textWidth } from './textWidth.ts';

/** Room between a mark and what names it, in px. */
const clear = 6;

function figure({ chart }: { chart: ChartOptions }, value: number): string {
  return withUnit(surpriseFigure(value, chart), 'pp');
}

/** Room right of the plot for the latest value beside the last bar, in px. */
export function latestRoom({ surprise }: SurpriseData, chart: ChartOptions): number {
  const value = surprise.findLast((one) => one !== null) ?? 0;
  return Math.max(74, clear + Math.ceil(textWidth(figure({ chart }, value), valueSize, 600)));
}

/** How far bars reach from the datum between two x, in px; up is negative. */
function reach(panel: Panel, data: SurpriseData, left: number, right: number, up: boolean): number {
  let farthest = panel.datumY;
  for (const [i, value] of data.surprise.entries()) {
    if (value === null || panel.x(i) > right || panel.x(i + 1) < left) continue;
    farthest = up ? Math.min(farthest, panel.y(value)) : Math.max(farthest, panel.y(value));
  }
  return farthest;
}

interface Latest {
  value: number;
  figure: Label;
  period: Label;
}

/** The latest value and its period, still without a place. */
function latest(panel: Panel, data: SurpriseData): Latest | null {
  const last = data.surprise.findLastIndex((value) => value !== null);
  if (last < 0) return null;
  const value = data.surprise[last]!;
  const { palette } = panel.chart;
  const where = side(value);
  const fill = where === 'level' ? palette.ink : palette[where];
  const at = { x: 0, y: 0 };
  return {
    value,
    figure: { ...at, text: figure(panel, value), fill, size: valueSize, weight: 600 },
    period: { ...at, text: periodLabel(data.periods[last]!, 'short'), fill: palette.ink2 },
  };
}

/** Baselines of figure and period are this far apart. */
const periodBelow = 18;

/** The latest value and its period beside the last bar, at its tip but never across the datum. */
export function besideLabels(panel: Panel, data: SurpriseData): Label[] {
  const found = latest(panel, data);
  if (found === null) return [];
  const wanted = panel.y(found.value) + 7;
  const y =
    found.value >= 0
      ? Math.min(wanted, panel.datumY - clear - 3 - periodBelow)
      : Math.max(wanted, panel.datumY + clear + 14);
  const x = panel.right + clear;
  return [
    { ...found.figure, x, y },
    { ...found.period, x, y: y + periodBelow },
  ];
}

/**
 * The latest value and its period beyond the last bars and the range, at the plot's right edge; null where another
 * bar keeps them so far from the latest that they would seem to name that one.
 */
export function insideLabels(panel: Panel, data: SurpriseData): Label[] | null {
  const found = latest(panel, data);
  if (found === null) return [];
  const up = found.value >= 0;
  const { right } = panel;
  const left = right - textWidth(found.figure.text, valueSize, 600) - clear;
  const bars = reach(panel, data, left, right, up);
  const edge = rangeEdge(panel, data, left, right, up);
  const end = up ? Math.min(bars, edge) : Math.max(bars, edge);
  if (Math.abs(end - panel.y(found.value)) > 48) return null;
  const y = up ? end - clear - 3 - periodBelow : end + clear + 13;
  const at = { x: right, anchor: 'end', halo: panel.chart.palette.paper } as const;
  return [
    { ...found.figure, ...at, y },
    { ...found.period, ...at, y: y + periodBelow },
  ];
}

/** The farthest surprise on each side, unless it is the latest, or inside the typical range, or has no room. */
export function annotations(panel: Panel, data: SurpriseData, taken: Label[]): Label[] {
  const last = data.surprise.findLastIndex((value) => value !== null);
  const boxes = taken.map(labelBox);
  const labels: Label[] = [];
  for (const up of [true, false]) {
    const sign = up ? 1 : -1;
    let farthest = -1;
    for (const [i, value] of data.surprise.entries()) {
      if (value === null || sign * value <= 0) continue;
      if (farthest < 0 || sign * value > sign * data.surprise[farthest]!) farthest = i;
    }
    if (farthest < 0 || farthest === last) continue;
    const value = data.surprise[farthest]!;
    if (side(value) === 'level' || Math.abs(value) <= (data.forecast_se[farthest] ?? 0)) continue;
    const barLeft = panel.x(farthest + (1 - barShare) / 2);
    const label: Label = {
      text: `${figure(panel, value)}, ${periodLabel(data.periods[farthest]!, 'short')}`,
      x: barLeft,
      y: up ? panel.y(value) - clear : panel.y(value) + clear + 10,
      fill: panel.chart.palette.ink,
      weight: 600,
      halo: panel.chart.palette.paper,
    };
    if (labelBox(label).right > panel.right) {
      label.anchor = 'end';
      label.x = panel.x(farthest + (1 + barShare) / 2);
    }
    const box = labelBox(label);
    if (box.left < panel.left || boxes.some((other) => overlap(box, other, clear))) continue;
    labels.push(label);
  }
  return labels;
}

/** What the shading is and how often it held, where no bar, edge or other label reaches; in two lines if need be. */
export function rangeLabels(
  panel: Panel,
  data: SurpriseData,
  share: number | null,
  taken: Label[],
): Label[] {
  const last = data.forecast_se.findLastIndex((error) => error !== null);
  if (last < 0 || share === null) return [];
  const size = figure(panel, data.forecast_se[last]!).replace('+', '±');
  const first = `typical range, now ${size};`;
  const held = `${Math.round(100 * share)}% of ${periodNoun(data.periods[last]!)}s inside`;
  const boxes = taken.map(labelBox);
  const inOne = placeLines(panel, data, [`${first} ${held}`], boxes);
  return inOne.length > 0 ? inOne : placeLines(panel, data, [first, held], boxes);
}

/** The place for lines of text that is nearest to the typical range; none where there is no room. */
function placeLines(panel: Panel, data: SurpriseData, lines: string[], taken: Box[]): Label[] {
  const { ink2: fill, paper: halo } = panel.chart.palette;
  const lineHeight = 16;
  let best: Label[] = [];
  let nearest = Infinity;
  for (const up of [true, false]) {
    for (let i = 0; i < data.periods.length; i += 1) {
      const labels = lines.map((text): Label => ({ text, x: panel.x(i) + 2, y: 0, fill, halo }));
      const right = Math.max(...labels.map((label) => labelBox(label).right));
      if (right > panel.right) break;
      const edge = rangeEdge(panel, data, panel.x(i), right, up);
      const bars = reach(panel, data, panel.x(i), right + 2, up);
      const end = up ? Math.min(edge, bars) : Math.max(edge, bars);
      const top = up ? end - clear - lineHeight * (lines.length - 1) : end + clear + 10;
      labels.forEach((label, line) => (label.y = top + lineHeight * line));
      const fits = labels.map(labelBox).every((box) => {
        const inside = box.top > 2 && box.bottom < panel.bottom + 14;
        return inside && !taken.some((other) => overlap(box, other, clear));
      });
      if (fits && Math.abs(end - edge) < nearest) {
        best = labels;
        nearest = Math.abs(end - edge);
      }
    }
  }
  return best;
}

function rangeEdge(
  panel: Panel,
  data: SurpriseData,
  left: number,
  right: number,
  up: boolean,
): number {
  const errors = data.forecast_se.filter(
    (error, i): error is number => error !== null && panel.x(i) <= right && panel.x(i + 1) >= left,
  );
  const widest = Math.max(0, ...errors);
  return panel.y(up ? widest : -widest);
}
