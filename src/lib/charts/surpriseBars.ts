import * as Plot from '@observablehq/plot';
import type { Values } from '../econ/types.ts';
import { spanLabel } from './axes.ts';
import { side, surpriseFigure, withUnit } from './figures.ts';
import type { Label } from './labels.ts';
import { periodLabel } from './periodLabels.ts';
import { barMarks } from './surpriseMarks.ts';
import { drawSvg } from './svg.ts';
import type { Chart, ChartOptions } from './svg.ts';

export interface SurpriseBarsOptions extends ChartOptions {
  economy: string;
  /** The periods to show, two years of them for monthly data; in log points. */
  data: { periods: string[]; surprise: Values };
  /** Half the height of the scale that the row shares, in pp: `symmetricDomain` of all its values. */
  domain: number;
  /** Whether the first and the last period are named below: for the first chart of a row. */
  labelled?: boolean;
}

/** Two years of surprises as small bars, on a scale shared along a row. */
export function surpriseBars(options: SurpriseBarsOptions): Chart {
  const { data, domain, width, palette } = options;
  const { periods } = data;
  const half = 50;
  const datumY = half + 2.5;
  const height = 2 * half + 25;
  const count = Math.max(periods.length, 1);
  const svg = drawSvg({
    chart: options,
    height,
    label: describe(options),
    x: { type: 'linear', domain: [0, count], range: [0, width] },
    y: { type: 'linear', domain: [-domain, domain], range: [datumY + half, datumY - half] },
    marks: [...barMarks(data, palette, domain / half), Plot.ruleY([0], { stroke: palette.ink })],
    labels: options.labelled ? ends(options, height - 6) : [],
  });
  return { svg, width, height, datumY };
}

function ends({ data, width, palette }: SurpriseBarsOptions, y: number): Label[] {
  const first = data.periods[0];
  const last = data.periods.at(-1);
  if (first === undefined || last === undefined) return [];
  const fill = palette.ink2;
  const labels: Label[] = [{ text: periodLabel(first, 'short'), x: 0, y, fill }];
  if (last !== first) {
    labels.push({ text: periodLabel(last, 'short'), x: width, y, fill, anchor: 'end' });
  }
  return labels;
}

function describe(options: SurpriseBarsOptions): string {
  const { economy, data } = options;
  const title = `${economy}: money surprises, ${spanLabel(data.periods)}`;
  const last = data.surprise.findLastIndex((value) => value !== null);
  if (last < 0) return `${title}: no values.`;
  const known = data.surprise.filter((value) => value !== null);
  const sides = known.map(side);
  const counted = (where: string) => sides.filter((one) => one === where).length;
  const figure = withUnit(surpriseFigure(data.surprise[last], options), 'pp');
  return `${title}: ${counted('above')} above, ${counted('below')} below, ${counted('level')} level; latest ${figure}.`;
}
