import * as Plot from '@observablehq/plot';
import { gaugeFrame, needle, previousMarks, tickLabels, typicalMarks } from './gauge.ts';
import type { GaugeScale } from './gauge.ts';
import { baselineAt } from './labels.ts';
import type { Label } from './labels.ts';
import { pathMark } from './panel.ts';
import { drawSvg } from './svg.ts';
import type { Chart, ChartOptions } from './svg.ts';

export interface GaugeKeyOptions extends ChartOptions {
  scale: GaugeScale;
  scaleHeight?: number;
  /** What a period is called. */
  noun?: 'month' | 'quarter' | 'year';
}

/** The rail left of a row of gauges: how to read one, and the labels of the scale that they share. */
export function gaugeKey(options: GaugeKeyOptions): Chart {
  const { scale, width, palette, scaleHeight = 376, noun = 'month' } = options;
  const frame = gaugeFrame(scale, scaleHeight);
  const { y, datumY, height } = frame;
  const unit = scale.domain / 1.25;
  const value = 0.7 * unit;
  const typical = 0.42 * unit;
  const previous = [0.6, 0.52, 0.3, 0.22, 0.1, 0.04, -0.05, -0.12, -0.2, -0.34, -0.4, -0.55];
  const x = 44;
  const text = (words: string, centre: number, fill = palette.ink2): Label => {
    return { text: words, x, y: baselineAt(centre), fill };
  };
  const svg = drawSvg({
    chart: options,
    height,
    label: `How to read a gauge: the bar is this ${noun}'s surprise, short ticks the previous 12 ${noun}s, shading the typical range; 0 is as expected.`,
    x: { type: 'identity' },
    y: { type: 'linear', domain: [-scale.domain, scale.domain], range: [frame.bottom, frame.top] },
    marks: [
      ...typicalMarks(typical, 0, options),
      pathMark(`M0.5,${frame.top}V${frame.bottom}`, palette.rule2),
      ...previousMarks(
        previous.map((one) => one * unit),
        0,
        options,
      ),
      Plot.ruleY([0], { stroke: palette.ink }),
      needle(y(value), datumY, 0, palette.ink3),
    ],
    labels: [
      text(`this ${noun}`, y(value), palette.ink),
      text(`previous 12 ${noun}s`, y(0.34 * unit)),
      text('as expected', datumY - 12),
      text(`typical range: two`, y(-0.4 * unit)),
      text(`${noun}s in three`, y(-0.4 * unit) + 16),
      ...tickLabels(options, scale, width - 6, y),
    ],
  });
  return { svg, width, height, datumY };
}
