import * as Plot from '@observablehq/plot';
import type { Values } from '../econ/types.ts';
import { side } from './figures.ts';
import type { Palette } from './palette.ts';

/** Share of a period's step that its bar fills. */
export const barShare = 0.66;

interface Bar {
  x1: number;
  x2: number;
  value: number;
  fill: string;
}

/** Bars by sign; ink where level. `unitsPerPixel` gives a level bar a height that can be seen. */
export function barMarks(
  { surprise }: { surprise: Values },
  palette: Palette,
  unitsPerPixel: number,
): Plot.Markish[] {
  const bars: Bar[] = [];
  for (const [i, value] of surprise.entries()) {
    if (value === null) continue;
    const where = side(value);
    bars.push({
      x1: i + (1 - barShare) / 2,
      x2: i + (1 + barShare) / 2,
      value: where === 'level' ? atLeast(value, 2 * unitsPerPixel) : value,
      fill: where === 'level' ? palette.ink : palette[where],
    });
  }
  return [Plot.rectY(bars, { x1: 'x1', x2: 'x2', y1: 0, y2: 'value', fill: 'fill' })];
}

function atLeast(value: number, size: number): number {
  return Math.abs(value) >= size ? value : value < 0 ? -size : size;
}

interface Corner {
  x: number;
  error: number;
  run: number;
}

/** ± each period's forecast standard error as steps; a period without one leaves a hole. */
export function rangeMarks(
  { forecast_se }: { forecast_se: Values },
  palette: Palette,
): Plot.Markish[] {
  const corners: Corner[] = [];
  let run = 0;
  for (const [i, error] of forecast_se.entries()) {
    if (error === null) {
      run += 1;
      continue;
    }
    corners.push({ x: i, error, run });
    const next = forecast_se[i + 1] ?? null;
    if (next === null) corners.push({ x: i + 1, error, run });
  }
  const lower = (corner: Corner) => -corner.error;
  const edge = {
    x: 'x',
    z: 'run',
    curve: 'step-after',
    stroke: palette.rule2,
    strokeWidth: 1,
  } as const;
  return [
    Plot.areaY(corners, {
      x: 'x',
      y1: lower,
      y2: 'error',
      z: 'run',
      curve: 'step-after',
      fill: palette.range,
    }),
    Plot.line(corners, { ...edge, y: 'error' }),
    Plot.line(corners, { ...edge, y: lower }),
  ];
}
