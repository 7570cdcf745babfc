import { side, surpriseFigure, withUnit } from './figures.ts';
import { labelBox, overlap, valueSize } from './labels.ts';
import type { Label } from './labels.ts';
import { narrowBelow } from './panel.ts';
import type { Panel } from './panel.ts';
import { periodLabel, periodNoun } from './periodLabels.ts';
import type { SurpriseData } from './surpriseData.ts';
import { barShare } from './surpriseMarks.ts';

/** Room between a mark and what names it, in px. */
const clear = 6;

function figure(panel: Panel, value: number): string {
  return withUnit(surpriseFigure(value, panel.chart), 'pp');
}

/** How far bars (and, if asked, the range) reach from the datum between two x, in px; up is negative. */
function reach(panel: Panel, data: SurpriseData, left: number, right: number, up: boolean): number {
  let farthest = panel.datumY;
  for (const [i, value] of data.surprise.entries()) {
    if (value === null || panel.x(i) > right || panel.x(i + 1) < left) continue;
    farthest = up ? Math.min(farthest, panel.y(value)) : Math.max(farthest, panel.y(value));
  }
  return farthest;
}

/** The latest value and its period: beside the last bar, or, in a narrow chart, beyond the last bars. */
export function latestLabels(panel: Panel, data: SurpriseData): Label[] {
  const last = data.surprise.findLastIndex((value) => value !== null);
  if (last < 0) return [];
  const value = data.surprise[last]!;
  const { palette, width } = panel.chart;
  const where = side(value);
  const fill = where === 'level' ? palette.ink : palette[where];
  const text = figure(panel, value);
  const period = periodLabel(data.periods[last]!, 'short');
  const up = value >= 0;
  if (width < narrowBelow) {
    const right = panel.right;
    const left = right - 76;
    const end = reach(panel, data, left, right, up);
    const y = up ? end - clear - 21 : end + clear + 16;
    return [
      { text, x: right, y, fill, anchor: 'end', size: valueSize, weight: 600, halo: palette.paper },
      { text: period, x: right, y: y + 18, fill: palette.ink2, anchor: 'end', halo: palette.paper },
    ];
  }
  const tip = panel.y(value);
  const wanted = tip + 7;
  const y = up
    ? Math.min(wanted, panel.datumY - clear - 21)
    : Math.max(wanted, panel.datumY + clear + 14);
  const x = panel.right + clear;
  return [
    { text, x, y, fill, size: valueSize, weight: 600 },
    { text: period, x, y: y + 18, fill: palette.ink2 },
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

/** What the shading is and how often it held, where no bar, edge or other label reaches. */
export function rangeLabels(
  panel: Panel,
  data: SurpriseData,
  share: number | null,
  taken: Label[],
): Label[] {
  const last = data.forecast_se.findLastIndex((error) => error !== null);
  if (last < 0 || share === null) return [];
  const size = figure(panel, data.forecast_se[last]!).replace('+', '±');
  const held = `${Math.round(100 * share)}% of ${periodNoun(data.periods[last]!)}s inside`;
  const text = `typical range, now ${size}; ${held}`;
  const boxes = taken.map(labelBox);
  let best: { label: Label; distance: number } | undefined;
  for (const up of [true, false]) {
    for (let i = 0; i < data.periods.length; i += 1) {
      const label: Label = {
        text,
        x: panel.x(i) + 2,
        y: 0,
        fill: panel.chart.palette.ink2,
        halo: panel.chart.palette.paper,
      };
      const { left, right } = labelBox(label);
      if (right > panel.right) break;
      const edge = rangeEdge(panel, data, left, right, up);
      const bars = reach(panel, data, left - 2, right + 2, up);
      const end = up ? Math.min(edge, bars) : Math.max(edge, bars);
      label.y = up ? end - clear : end + clear + 10;
      const box = labelBox(label);
      if (box.top < 2 || box.bottom > panel.bottom + 12) continue;
      if (boxes.some((other) => overlap(box, other, clear))) continue;
      const distance = Math.abs(end - edge);
      if (best === undefined || distance < best.distance) best = { label, distance };
    }
  }
  return best === undefined ? [] : [best.label];
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
