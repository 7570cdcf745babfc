import * as Plot from '@observablehq/plot';
import type { InflationResult } from '../econ/types.ts';
import type { Palette } from './palette.ts';
import { periodNoun } from './periodLabels.ts';

/** What the chart shows of a result: arrays over `periods`, in log points. */
export interface InflationData {
  periods: string[];
  inflation: InflationResult;
}

export type PartName = Exclude<keyof InflationResult, 'actual'>;

/** The parts in the order in which they are stacked. */
export const partOrder: PartName[] = [
  'expected_money',
  'current_surprise',
  'carry_over',
  'unexplained',
];

/** What readers see for each part of the accounting of a period. */
export function partNames(period: string): Record<PartName, string> {
  return {
    expected_money: 'Expected money less trend',
    current_surprise: `This ${periodNoun(period)}’s surprise`,
    carry_over: 'Carry-over',
    unexplained: 'Unexplained',
  };
}

export interface Part {
  name: PartName;
  index: number;
  /** End nearer to the datum, and the farther one, in log points. */
  from: number;
  to: number;
}

/** Every part stacked from the datum: those above 0 upwards, those below downwards; a missing one takes no room. */
export function stackParts(inflation: InflationResult): Part[] {
  const parts: Part[] = [];
  for (const index of inflation.actual.keys()) {
    let up = 0;
    let down = 0;
    for (const name of partOrder) {
      const value = inflation[name][index] ?? null;
      if (value === null || !Number.isFinite(value)) continue;
      const from = value >= 0 ? up : down;
      const to = from + value;
      if (value >= 0) up = to;
      else down = to;
      parts.push({ name, index, from, to });
    }
  }
  return parts;
}

const columnShare = 0.62;

/** The parts as columns; `hatch` is the paint of carry-over. */
export function partMarks(parts: Part[], palette: Palette, hatch: string): Plot.Markish[] {
  const of = (name: PartName) => parts.filter((part) => part.name === name);
  const place = {
    x1: (part: Part) => part.index + (1 - columnShare) / 2,
    x2: (part: Part) => part.index + (1 + columnShare) / 2,
    y1: 'from',
    y2: 'to',
  };
  // The hairline of paper keeps neighbours apart where their colours are near in lightness.
  const seam = { stroke: palette.paper, strokeWidth: 1 };
  const outline = { ...place, inset: 0.5, stroke: palette.ink2, strokeWidth: 1 };
  return [
    Plot.rect(of('expected_money'), { ...place, ...seam, fill: palette.solid }),
    Plot.rect(of('current_surprise'), {
      ...place,
      ...seam,
      fill: ({ from, to }: Part) => (to >= from ? palette.above : palette.below),
    }),
    Plot.rect(of('carry_over'), { ...outline, fill: hatch }),
    Plot.rect(of('unexplained'), { ...outline, fill: 'none', strokeDasharray: '3 2' }),
  ];
}

/** Hatching of carry-over, for `<defs>`. */
export function hatchPattern(id: string, palette: Palette): string {
  return (
    `<pattern id="${id}" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(-45)">` +
    `<rect width="5" height="5" fill="${palette.paper}"/>` +
    `<path d="M0,2.5H5" stroke="${palette.ink2}" stroke-width="1.2"/></pattern>`
  );
}
