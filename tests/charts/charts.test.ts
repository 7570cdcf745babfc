import { describe, expect, it } from 'vitest';
import { accountingSwatch } from '../../src/lib/charts/accountingSwatch.ts';
import { explainerCharts } from '../../src/lib/charts/explainerCharts.ts';
import { gapChart } from '../../src/lib/charts/gapChart.ts';
import { gauge, gaugeScale } from '../../src/lib/charts/gauge.ts';
import { gaugeKey } from '../../src/lib/charts/gaugeKey.ts';
import { inflationChart } from '../../src/lib/charts/inflationChart.ts';
import { lightPalette } from '../../src/lib/charts/palette.ts';
import { surpriseBars } from '../../src/lib/charts/surpriseBars.ts';
import { surpriseChart } from '../../src/lib/charts/surpriseChart.ts';
import { drawing, sampleResult, widths } from './sample.ts';

const data = sampleResult();
const scale = gaugeScale([data]);
const gaugeData = { economy: 'Costa Lirra', periodLabel: 'August 2031', history: data };
const gapOptions = { data, persistent: true, rejected: false };

const charts = {
  surpriseChart: (width: number) => surpriseChart({ ...drawing, width, data }),
  gapChart: (width: number) => gapChart({ ...drawing, ...gapOptions, width }),
  inflationChart: (width: number) => inflationChart({ ...drawing, width, data }),
  gauge: (width: number) => gauge({ ...drawing, width, data: gaugeData, scale }),
  gaugeKey: (width: number) => gaugeKey({ ...drawing, width, scale }),
  surpriseBars: (width: number) =>
    surpriseBars({ ...drawing, width, economy: 'Costa Lirra', data, domain: 1.5, labelled: true }),
};

describe.each(Object.entries(charts))('%s', (name, draw) => {
  it('keeps its picture', async () => {
    // An element a line, so that a difference can be read.
    const lines = draw(600).svg.replaceAll('><', '>\n<');
    await expect(`${lines}\n`).toMatchFileSnapshot(`snapshots/${name}.svg`);
  });

  it.each(widths)('is one image with words at %i px, drawn without style or script', (width) => {
    const { svg, height, datumY } = draw(width);
    expect(svg).toMatch(/^<svg [^>]*role="img" aria-label="[^"]{20,}"/);
    expect(svg).toContain(`width="${width}" height="${height}"`);
    expect(svg).not.toMatch(/style|class=|<script|on[a-z]+="|NaN|undefined|Infinity/);
    expect(datumY % 1).toBe(0.5);
    expect(datumY).toBeLessThan(height);
  });

  it('draws its datum in ink from edge to edge', () => {
    const { svg, width, datumY } = draw(600);
    const line = `<line x1="0" x2="${width}" y1="${datumY}" y2="${datumY}"/>`;
    expect(svg).toContain(`<g stroke="${lightPalette.ink}">${line}`);
  });
});

describe('ids', () => {
  it('start with the prefix', () => {
    const { svg } = charts.inflationChart(600);
    const ids = [...svg.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id);
    expect(ids).toEqual(['test-hatch']);
    expect(svg).toContain('url(#test-hatch)');
  });
});

describe('explainerCharts', () => {
  it.each([480, 600, 720, 1248])('share datum, height and scale at %i px', (width) => {
    const { surprise, gap } = explainerCharts({ ...drawing, ...gapOptions, width });
    expect(gap.datumY).toBe(surprise.datumY);
    expect(gap.height).toBe(surprise.height);
    const grid = (svg: string) => [...svg.matchAll(/>([+−][\d.]+)<\/text>/g)].map(([, t]) => t);
    const ticks = grid(surprise.svg);
    expect(ticks.length).toBeGreaterThan(3);
    expect(grid(gap.svg).slice(0, ticks.length)).toEqual(ticks);
  });
});

describe('gapChart', () => {
  it('is dashed and has no band where neutrality is rejected', () => {
    const { svg } = gapChart({ ...drawing, ...gapOptions, width: 600, rejected: true });
    expect(svg).toContain('stroke-dasharray');
    expect(svg).not.toContain(lightPalette.range);
    expect(svg).toContain('an assumption, not an estimate');
  });

  it('is not called a gap without persistence', () => {
    const { svg } = gapChart({ ...drawing, ...gapOptions, width: 600, persistent: false });
    expect(svg).toContain('Same-month output effect of the surprise');
    expect(svg.toLowerCase()).not.toContain('gap');
  });

  it('colours the line by side, and joins nothing across a hole', () => {
    const holed = { ...data, gap: data.gap.map((value, i) => (i % 7 === 3 ? null : value)) };
    const { svg } = gapChart({ ...drawing, ...gapOptions, data: holed, width: 600 });
    expect(svg).toContain(`stroke="${lightPalette.above}"`);
    expect(svg).toContain(`stroke="${lightPalette.below}"`);
  });

  it('draws an empty panel where no gap is published', () => {
    const none = { ...data, gap: null, gap_lower: null, gap_upper: null };
    const { svg } = gapChart({ ...drawing, ...gapOptions, data: none, width: 600 });
    expect(svg).toContain('no values.');
  });
});

describe('gauge', () => {
  it('turns to standard deviations where one surprise would flatten the others', () => {
    const wild = sampleResult({ scale: 8, seed: 3 });
    expect(gaugeScale([data]).unit).toBe('pp');
    const shared = gaugeScale([data, data, wild]);
    expect(shared.unit).toBe('s.d.');
    const { svg } = gauge({ ...drawing, width: 184, data: gaugeData, scale: shared });
    expect(svg).toMatch(/aria-label="[^"]*s\.d\./);
  });

  it('stays empty, and says so, where the period is not out', () => {
    const { svg } = gauge({
      ...drawing,
      width: 184,
      scale,
      data: { ...gaugeData, history: null },
    });
    expect(svg).toContain('not yet published');
    expect(svg).not.toContain('<text');
  });

  it.each([
    [184, 0.84, 38],
    [168, 12.34, 32],
    [168, 0, 38],
    [130, 0.84, 26],
    [52, 0.84, null],
  ])('at %i px prints %d at a size that fits, or leaves it to the page', (width, value, size) => {
    const history = { surprise: [value], forecast_se: [0.45], standardised_surprise: [value] };
    const { svg } = gauge({
      ...drawing,
      width,
      scale: { unit: 'pp', domain: value + 1 },
      data: { ...gaugeData, history },
    });
    const found = /font-size="(\d+)" font-weight="300"/.exec(svg)?.[1];
    expect(found === undefined ? null : Number(found)).toBe(size);
  });

  it.each([0.84, 0.02, 0, -0.004, -0.03, -0.33, -1.2])('keeps %d off the datum', (value) => {
    const history = { surprise: [value], forecast_se: [0.45], standardised_surprise: [value] };
    const chart = gauge({
      ...drawing,
      width: 184,
      scale: { unit: 'pp', domain: 1.25 },
      data: { ...gaugeData, history },
    });
    const baseline = Number(/<text x="[\d.]+" y="([\d.]+)"/.exec(chart.svg)![1]);
    const above = baseline <= chart.datumY - 8;
    const below = baseline - 0.75 * 38 >= chart.datumY + 7.9;
    expect(value < -0.005 ? below : above).toBe(true);
  });
});

describe('accountingSwatch', () => {
  it('is a mark without words for every part, with ids of its own', () => {
    const parts = [
      'expected_money',
      'current_surprise',
      'carry_over',
      'unexplained',
      'actual',
    ] as const;
    const swatches = parts.map((part) =>
      accountingSwatch(part, { palette: lightPalette, idPrefix: `list-${part}` }),
    );
    expect(new Set(swatches).size).toBe(parts.length);
    for (const svg of swatches) {
      expect(svg).toContain('aria-hidden="true"');
      expect(svg).not.toMatch(/style|<text/);
    }
    expect(swatches[2]).toContain('url(#list-carry_over-hatch)');
  });
});
