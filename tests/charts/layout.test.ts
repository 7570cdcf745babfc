import { describe, expect, it } from 'vitest';
import { symmetricDomain, tickStep, valueTicks } from '../../src/lib/charts/axes.ts';
import { gapChart } from '../../src/lib/charts/gapChart.ts';
import { inflationChart } from '../../src/lib/charts/inflationChart.ts';
import { overlap, spread } from '../../src/lib/charts/labels.ts';
import { lightPalette } from '../../src/lib/charts/palette.ts';
import { surpriseChart } from '../../src/lib/charts/surpriseChart.ts';
import { shareInside } from '../../src/lib/charts/surpriseData.ts';
import { bars, collisions, labels } from './geometry.ts';
import { drawing, sampleResult, widths } from './sample.ts';

const frequencies = ['monthly', 'quarterly', 'annual'] as const;
const cases = widths.flatMap((width) =>
  frequencies.flatMap((frequency) =>
    [0.002, 0.45, 25].map((scale) => ({ width, frequency, scale })),
  ),
);
const seeds = [1, 2];

describe.each(cases)('$frequency, $width px, surprises of $scale', ({ width, ...sample }) => {
  it('labels nothing over anything else, and inside the chart', () => {
    for (const seed of seeds) {
      const data = sampleResult({ ...sample, seed });
      const charts = [
        surpriseChart({ ...drawing, width, data }),
        gapChart({ ...drawing, width, data, persistent: true, rejected: false }),
        gapChart({ ...drawing, width, data, persistent: true, rejected: true }),
        inflationChart({ ...drawing, width, data }),
      ];
      for (const { svg, height, datumY } of charts) {
        const named = labels(svg);
        expect(collisions(named)).toEqual([]);
        for (const { text, box } of named) {
          expect(box.left, text).toBeGreaterThanOrEqual(-1);
          expect(box.right, text).toBeLessThanOrEqual(width + 1);
          expect(box.top, text).toBeGreaterThanOrEqual(0);
          expect(box.bottom, text).toBeLessThanOrEqual(height);
          expect(box.top < datumY && box.bottom > datumY, `${text} crosses the datum`).toBe(false);
        }
      }
    }
  });

  it('sets no words over a bar of the surprise', () => {
    for (const seed of seeds) {
      const { svg } = surpriseChart({ ...drawing, width, data: sampleResult({ ...sample, seed }) });
      const words = labels(svg).filter(({ text }) => /pp|typical|inside/.test(text));
      for (const { text, box } of words) {
        expect(
          bars(svg).filter((bar) => overlap(box, bar.box)),
          text,
        ).toEqual([]);
      }
    }
  });
});

describe('surpriseChart', () => {
  it('draws one bar a period, on its side of the datum and in its colour', () => {
    const data = sampleResult({ count: 36 });
    const { svg, datumY } = surpriseChart({ ...drawing, width: 600, data });
    const drawn = bars(svg);
    expect(drawn).toHaveLength(36);
    drawn.forEach(({ fill, box }, i) => {
      const value = data.surprise[i]!;
      const edge = value >= 0 ? box.bottom : box.top;
      expect(edge).toBeCloseTo(datumY, 1);
      const colour =
        Math.abs(value) < 0.05
          ? lightPalette.ink
          : value > 0
            ? lightPalette.above
            : lightPalette.below;
      expect(fill).toBe(colour);
    });
  });

  it('leaves out a missing value, and tells it from zero', () => {
    const data = { periods: ['2031-06', '2031-07', '2031-08'], surprise: [0, null, 0] };
    const { svg } = surpriseChart({
      ...drawing,
      width: 350,
      data: { ...data, forecast_se: [null, null, null] },
    });
    const drawn = bars(svg);
    expect(drawn).toHaveLength(2);
    expect(drawn.every(({ box }) => box.bottom - box.top >= 1.9)).toBe(true);
  });

  it('draws a single period', () => {
    const data = { periods: ['2031-08'], surprise: [0.84], forecast_se: [0.45] };
    const { svg } = surpriseChart({ ...drawing, width: 600, data });
    expect(bars(svg)).toHaveLength(1);
    expect(svg).toContain('Money surprise, percentage points, Aug 2031.');
  });

  it('says how often the typical range held, over the whole history', () => {
    const data = sampleResult({ count: 60 });
    const share = shareInside(data)!;
    const { svg } = surpriseChart({ ...drawing, width: 600, data });
    expect(svg).toContain(`${Math.round(100 * share)}% of months inside`);
    expect(shareInside({ periods: ['1970'], surprise: [1], forecast_se: [null] })).toBeNull();
  });

  it('prints a decimal comma throughout', () => {
    const { svg } = surpriseChart({
      ...drawing,
      width: 600,
      data: sampleResult(),
      decimalMark: ',',
    });
    for (const { text } of labels(svg)) expect(text).not.toMatch(/\d\.\d/);
    expect(/aria-label="([^"]*)"/.exec(svg)![1]).not.toMatch(/\d\.\d/);
  });
});

describe('inflationChart', () => {
  it('draws a part for each value and omits what is missing', () => {
    const data = sampleResult({ count: 13 });
    const { actual, ...parts } = data.inflation;
    const unknown = actual.map(() => null);
    const all = bars(inflationChart({ ...drawing, width: 720, data }).svg);
    expect(all.length - 1).toBe(4 * actual.length);
    const some = inflationChart({
      ...drawing,
      width: 720,
      data: { ...data, inflation: { actual, ...parts, carry_over: unknown, unexplained: unknown } },
    });
    expect(bars(some.svg).length - 1).toBe(2 * actual.length);
    expect(some.svg).not.toContain('Carry-over');
  });
});

describe('scales', () => {
  it('are symmetric whole ticks that hold every value', () => {
    expect(symmetricDomain([0.3, -1.25, null])).toBeCloseTo(1.5, 12);
    expect(symmetricDomain([0.94])).toBeCloseTo(1, 12);
    expect(symmetricDomain([0, 0])).toBe(1);
    expect(symmetricDomain([-1400])).toBe(1500);
    expect(symmetricDomain([])).toBe(1);
  });

  it('have round steps, and labels without the datum', () => {
    expect(tickStep(1.25, 4)).toBeCloseTo(0.5, 12);
    expect(tickStep(32, 4)).toBe(10);
    expect(valueTicks(-1, 1, 0.5).map(({ label }) => label)).toEqual([
      '−1.0',
      '−0.5',
      '+0.5',
      '+1.0',
    ]);
    expect(valueTicks(-400, 400, 200).map(({ label }) => label)).toEqual([
      '−400',
      '−200',
      '+200',
      '+400',
    ]);
  });
});

describe('spread', () => {
  it('moves only what is too near, keeps order and centres groups', () => {
    expect(spread([0, 100, 200], 19)).toEqual([0, 100, 200]);
    expect(spread([100, 100], 20)).toEqual([90, 110]);
    const moved = spread([52, 40, 50], 10);
    expect(moved[1]!).toBeLessThan(moved[2]!);
    expect(moved[2]!).toBeLessThan(moved[0]!);
    expect(spread([], 10)).toEqual([]);
  });
});
