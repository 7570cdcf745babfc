import { periodsShown, spanLabel, symmetricDomain } from './axes.ts';
import { side, surpriseFigure, withUnit } from './figures.ts';
import { periodLabel, periodNoun } from './periodLabels.ts';
import {
  axisLabels,
  datumMarks,
  gridMarks,
  narrowBelow,
  panel,
  panelScales,
  plotHeight,
} from './panel.ts';
import type { Panel } from './panel.ts';
import { shareInside } from './surpriseData.ts';
import type { SurpriseData } from './surpriseData.ts';
import { barMarks, rangeMarks } from './surpriseMarks.ts';
import {
  annotations,
  besideLabels,
  insideLabels,
  latestRoom,
  rangeLabels,
} from './surpriseLabels.ts';
import { labelBox } from './labels.ts';
import type { Label } from './labels.ts';
import { drawSvg } from './svg.ts';
import type { Chart, ChartOptions } from './svg.ts';

export interface SurpriseChartOptions extends ChartOptions {
  data: SurpriseData;
  /** How many of the last periods to show; as many whole years as the width holds, unless given. */
  count?: number;
  /** Half the height of the scale, in pp: give two charts the same and they share their datum and scale. */
  domain?: number;
}

/** The last periods of `data` that a chart of `width` px shows. */
export function shownSurprises(data: SurpriseData, width: number, count?: number): SurpriseData {
  const shown = count ?? periodsShown(data.periods, width);
  const from = Math.max(0, data.periods.length - Math.max(shown, 1));
  return {
    periods: data.periods.slice(from),
    surprise: data.surprise.slice(from),
    forecast_se: data.forecast_se.slice(from),
  };
}

/** Half the height of the scale that holds the surprises shown and their typical range, in pp. */
export function surpriseDomain(shown: SurpriseData): number {
  return symmetricDomain([...shown.surprise, ...shown.forecast_se]);
}

/**
 * Money surprises as bars around the datum, with the typical range (± each period's forecast standard error),
 * the latest value and at most two others named. Log points, called pp.
 */
export function surpriseChart(options: SurpriseChartOptions): Chart {
  const { data, width, count } = options;
  const shown = shownSurprises(data, width, count);
  const domain = options.domain ?? surpriseDomain(shown);
  const { area, latest } = placeLatest(options, shown, domain);
  const named = annotations(area, shown, latest);
  const share = shareInside(data);
  const labels = [
    ...axisLabels(area),
    ...latest,
    ...named,
    ...rangeLabels(area, shown, share, [...latest, ...named]),
  ];
  const svg = drawSvg({
    chart: options,
    height: area.height,
    label: describe(options, shown, share),
    ...panelScales(area, domain),
    marks: [
      ...rangeMarks(shown, options.palette),
      ...gridMarks(area),
      ...barMarks(shown, options.palette, (2 * domain) / plotHeight(width)),
      ...datumMarks(area),
    ],
    labels,
  });
  return { svg, width, height: area.height, datumY: area.datumY };
}

/** The panel with its latest value: beside the plot, or inside a narrow one, which then may need room on top. */
function placeLatest(
  chart: ChartOptions,
  shown: SurpriseData,
  domain: number,
): { area: Panel; latest: Label[] } {
  const frame = { chart, periods: shown.periods, domain };
  if (chart.width < narrowBelow) {
    const area = panel({ ...frame, marginRight: 0 });
    const latest = insideLabels(area, shown);
    if (latest !== null) {
      const overflow = Math.ceil(2 - Math.min(2, ...latest.map((label) => labelBox(label).top)));
      const lowered = latest.map((label) => ({ ...label, y: label.y + overflow }));
      return {
        area: panel({ ...frame, marginRight: 0, marginTop: 24 + overflow }),
        latest: lowered,
      };
    }
  }
  const area = panel({ ...frame, marginRight: latestRoom(shown, chart) });
  return { area, latest: besideLabels(area, shown) };
}

function describe(
  options: SurpriseChartOptions,
  shown: SurpriseData,
  share: number | null,
): string {
  const { periods, surprise, forecast_se } = shown;
  const named = (i: number) =>
    `${withUnit(surpriseFigure(surprise[i] ?? null, options), 'pp')} in ${periodLabel(periods[i]!)}`;
  const last = surprise.findLastIndex((value) => value !== null);
  if (last < 0) return `Money surprise, percentage points, ${spanLabel(periods)}: no values.`;
  const where = side(surprise[last]!);
  const relation = where === 'level' ? 'level' : `${where} expectation`;
  const known = surprise.map((value, i) => ({ value, i })).filter(({ value }) => value !== null);
  const order = known.sort((a, b) => a.value! - b.value!);
  const error = forecast_se[last] ?? null;
  const sentences = [
    `Money surprise, percentage points, ${spanLabel(periods)}.`,
    `Latest: ${named(last)}, ${relation}.`,
    `Highest ${named(order.at(-1)!.i)}; lowest ${named(order[0]!.i)}.`,
  ];
  if (error !== null && share !== null) {
    const size = withUnit(surpriseFigure(error, options).replace('+', '±'), 'pp');
    sentences.push(
      `Typical range ${size}; ${Math.round(100 * share)}% of ${periodNoun(periods[0]!)}s were inside theirs.`,
    );
  }
  return sentences.join(' ');
}
