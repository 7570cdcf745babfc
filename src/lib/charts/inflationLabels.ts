import { parsePeriod, seasonOf } from '../econ/periods.ts';
import { accountingFigure } from './figures.ts';
import { partNames } from './inflationParts.ts';
import type { InflationData, Part } from './inflationParts.ts';
import { baselineAt, labelBox, labelSize, overlap, spread } from './labels.ts';
import type { Label } from './labels.ts';
import { monthName } from './periodLabels.ts';
import type { ChartOptions } from './svg.ts';
import { textWidth } from './textWidth.ts';

/** Room for the leaders between the plot and the names, in px. */
export const leaderRoom = 34;

export interface NamedMark {
  /** Middle of the mark, and of its label, in px. */
  mark: number;
  centre: number;
  labels: Label[];
}

/** Figures and names of the last column's parts and of inflation, apart from each other and from the datum. */
export function inflationLabels(
  { periods, inflation }: InflationData,
  parts: Part[],
  place: { x: number; y: (value: number) => number; options: ChartOptions },
): NamedMark[] {
  const last = inflation.actual.findLastIndex((value) => value !== null);
  if (last < 0) return [];
  const { x, y, options } = place;
  const { ink, ink2 } = options.palette;
  const names = partNames(periods[last]!);
  const inflationValue = inflation.actual[last]!;
  const named = [
    ...parts
      .filter(({ index }) => index === last)
      .map(({ name, from, to }) => {
        return { value: to - from, middle: (from + to) / 2, name: names[name], strong: false };
      }),
    { value: inflationValue, middle: inflationValue, name: 'Inflation', strong: true },
  ];
  const centres = clear(
    named.map(({ middle }) => y(middle)),
    y(0),
  );
  return named.map(({ value, middle, name, strong }, i) => {
    const centre = centres[i]!;
    const figure = accountingFigure(value, options);
    const baseline = baselineAt(centre);
    return {
      mark: y(middle),
      centre,
      labels: [
        { text: figure, x, y: baseline, fill: ink, weight: 600 },
        {
          text: name,
          x: x + textWidth(figure, labelSize, 600) + 4,
          y: baseline,
          fill: strong ? ink : ink2,
          weight: strong ? 600 : 400,
        },
      ],
    };
  });
}

/** Moves label centres apart; those of one side stay on it, since the datum runs on to the page's edge. */
function clear(middles: number[], datumY: number): number[] {
  const centres = [...middles];
  for (const sign of [-1, 1]) {
    const members = middles.flatMap((middle, i) =>
      (sign < 0 ? middle <= datumY : middle > datumY) ? [i] : [],
    );
    const apart = spread(
      members.map((i) => middles[i]!),
      19,
    );
    const nearest = Math.min(...apart.map((centre) => sign * (centre - datumY)));
    const shift = Math.max(0, 11 - nearest);
    members.forEach((i, k) => (centres[i] = apart[k]! + sign * shift));
  }
  return centres;
}

/** Room right of the plot for the leaders and the longest of the names, in px. */
export function nameRoom({ periods, inflation }: InflationData, options: ChartOptions): number {
  const last = periods.at(-1);
  if (last === undefined) return 0;
  const names = [...Object.values(partNames(last)), 'Inflation'];
  const figures = Object.values(inflation).map((values) =>
    accountingFigure(values.at(-1), options),
  );
  const widest = (texts: string[], weight: 400 | 600) =>
    Math.max(...texts.map((text) => textWidth(text, labelSize, weight)));
  return leaderRoom + Math.ceil(widest(figures, 600) + 4 + widest(names, 400));
}

/** Lines from the last column's marks to their labels. */
export function leaderPaths(named: NamedMark[], right: number): string {
  return named.map(({ mark, centre }) => `M${right},${mark}h8L${right + 20},${centre}h8`).join('');
}

/** Names of the periods under their columns, with the year under the first and under each that starts one. */
export function periodLabels(
  periods: string[],
  column: number,
  place: { x: (index: number) => number; y: number; fill: string },
): Label[] {
  const parts = periods.map((period) => {
    const { frequency, index } = parsePeriod(period);
    const season = seasonOf(index, frequency);
    const names = {
      monthly: () => monthName(season + 1, 'short'),
      quarterly: () => `Q${season + 1}`,
      annual: () => '',
    };
    return { season, year: period.slice(0, 4), name: names[frequency]() };
  });
  const widest = Math.max(...parts.map(({ name }) => textWidth(name, labelSize)));
  const labels: Label[] = [];
  const years: Label[] = [];
  for (const [i, { season, year, name }] of parts.entries()) {
    const at = { x: place.x(i + 0.5), fill: place.fill, anchor: 'middle' } as const;
    // All names are cut to their first letter or none is: a mixture would be hard to read.
    const text = widest + 4 <= column ? name : name.slice(0, 1);
    if (text !== '') labels.push({ ...at, y: place.y, text });
    if (i !== 0 && season !== 0) continue;
    const label: Label = { ...at, y: place.y + (text === '' ? 0 : 16), text: year };
    const before = years.at(-1);
    if (before === undefined || !overlap(labelBox(before), labelBox(label), 6)) years.push(label);
    // A year that starts here matters more than the first column's, in which it does not start.
    else if (years.length === 1 && parts[0]!.season !== 0) years[0] = label;
  }
  return [...labels, ...years];
}
