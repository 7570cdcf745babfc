import { beforeAll, describe, expect, it } from 'vitest';
import { overlap } from '../../src/lib/charts/labels.ts';
import { darkPalette, lightPalette } from '../../src/lib/charts/palette.ts';
import { textWidth } from '../../src/lib/charts/textWidth.ts';
import { loadFonts } from '../../src/lib/images/fonts.ts';
import { shareImage, wideSvg } from '../../src/lib/images/shareImage.ts';
import type { ShareImageInput } from '../../src/lib/images/shareImage.ts';
import { measure } from '../../src/lib/images/typesetting.ts';
import type { TextBlock } from '../../src/lib/images/typesetting.ts';
import { chartZone, datumAt } from '../../src/lib/images/wideLayout.ts';
import { growthWords, shortCaution } from '../../src/lib/images/words.ts';
import { sampleResult } from '../charts/sample.ts';
import { barBoxes, textBoxes } from './geometry.ts';

const fonts = 'node_modules/@fontsource';
const caution = 'Model-implied: not a measurement of output, not a forecast.';

function input(surprise: number, others: Partial<ShareImageInput> = {}): ShareImageInput {
  const { periods, surprise: earlier, forecast_se } = sampleResult({ count: 60 });
  return {
    economy: 'Costa Lirra',
    period: '2031-08',
    title: 'Costa Lirra’s money grew 0.84 points faster than expected',
    surprise,
    growth: 1.1434,
    expected: 0.3095,
    forecast_se: 0.45,
    history: { periods, surprise: [...earlier.slice(0, -1), surprise], forecast_se },
    source: 'Costa Lirra monetary survey',
    methodVersion: '1.4',
    ...others,
  };
}

const longName = 'The United Commonwealth of the Northern and Southern Archipelagos and Outer Łódź';
const cases: Record<string, ShareImageInput> = {
  above: input(0.84),
  below: input(-0.71),
  level: input(0.0),
  'level and negative': input(-0.03),
  'at the edge of level': input(-0.05),
  large: input(12.34, { growth: 120, expected: -80 }),
  'large and negative': input(-112.34, { growth: -1120, expected: -80 }),
  'with a decimal comma': input(12.34, { decimalMark: ',', growth: 120 }),
  'with long names': input(0.84, {
    economy: longName,
    source: `${longName}, Central Monetary Authority, statistical bulletin`,
  }),
  'with a long title': input(-0.71, {
    title: `${longName} saw its money grow by 12.34 points less than anybody had reason to expect`,
  }),
  'with a title of one endless word': input(0.84, { title: 'Slackwater'.repeat(20) }),
  'without a typical range': input(0.84, { forecast_se: null }),
  quarterly: input(0.84, {
    period: '2000-Q4',
    history: sampleResult({ frequency: 'quarterly', count: 30 }),
  }),
  'in its first year': input(0.84, {
    period: '1970',
    history: { periods: ['1970'], surprise: [0.84], forecast_se: [0.5] },
  }),
};

describe.each(Object.entries(cases))('the wide image, %s', (_, given) => {
  let svg: string;
  let blocks: TextBlock[];

  beforeAll(async () => {
    ({ svg, blocks } = await wideSvg(given, fonts));
  });

  it('keeps text, figure and chart apart and inside its margins', () => {
    const boxes = textBoxes(svg);
    expect(boxes).toHaveLength(blocks.length);
    const named = blocks.map(({ name }, i) => ({ name, box: boxes[i]! }));
    const bars = barBoxes(svg);
    for (const [i, { name, box }] of named.entries()) {
      expect(box.left, name).toBeGreaterThanOrEqual(56);
      expect(box.right, name).toBeLessThanOrEqual(1144);
      expect(box.top, name).toBeGreaterThanOrEqual(54);
      expect(box.bottom, name).toBeLessThanOrEqual(600);
      const touched = named.slice(i + 1).filter((other) => overlap(box, other.box));
      expect(touched, name).toEqual([]);
      expect(
        bars.filter((bar) => overlap(box, bar)),
        name,
      ).toEqual([]);
    }
    for (const bar of bars) {
      expect(bar.left).toBeGreaterThanOrEqual(chartZone.left);
      expect(bar.right).toBeLessThanOrEqual(chartZone.right);
      expect(bar.top).toBeGreaterThanOrEqual(chartZone.top - 0.1);
      expect(bar.bottom).toBeLessThanOrEqual(chartZone.bottom + 0.1);
    }
  });

  it('stands its figure on the datum or hangs it there, with the label on the other side', () => {
    const boxes = textBoxes(svg);
    const figure = boxes[blocks.findIndex(({ name }) => name === 'figure')]!;
    const label = boxes[blocks.findIndex(({ name }) => name === 'explanation 1')]!;
    const hanging = given.surprise <= -0.005;
    const datum = datumAt(hanging);
    expect(svg).toContain(`<rect y="${datum - 1}" width="1200" height="2"`);
    if (hanging) {
      expect(Math.abs(figure.top - datum)).toBeLessThan(4);
      expect(label.bottom).toBeLessThan(datum);
    } else {
      // Round figures overshoot their line a little; a decimal comma hangs from it.
      const reach = given.decimalMark === ',' ? 40 : 4;
      expect(figure.bottom).toBeGreaterThanOrEqual(datum - 1);
      expect(figure.bottom - datum).toBeLessThan(reach);
      expect(label.top).toBeGreaterThan(datum);
    }
  });

  it('sets all words as paths, none smaller than 19 px', () => {
    expect(svg).not.toMatch(/<text|<image|<style|font-family|style=|NaN|undefined/);
    for (const { size, name } of blocks) expect(size, name).toBeGreaterThanOrEqual(19);
    expect(blocks.map(({ text }) => text)).toContain(caution);
  });
});

describe('shareImage', () => {
  it('makes a PNG of 1200 × 630', async () => {
    const { png } = await shareImage(input(0.84), fonts);
    const view = new DataView(png.buffer, png.byteOffset, png.byteLength);
    expect([...png.subarray(1, 4)].map((byte) => String.fromCharCode(byte)).join('')).toBe('PNG');
    expect([view.getUint32(16), view.getUint32(20)]).toEqual([1200, 630]);
  });

  it('is the same at every run', async () => {
    const [first, second] = [
      await shareImage(input(0.84), fonts),
      await shareImage(input(0.84), fonts),
    ];
    expect(second.svg).toBe(first.svg);
    expect(Buffer.compare(second.png, first.png)).toBe(0);
  });

  it('says in words what it shows, with the caution, source and licence', async () => {
    const { alt, caption } = await shareImage(input(0.84), fonts);
    expect(alt).toContain(
      'Costa Lirra, August 2031: money surprise +0.84\u00a0pp, above expectation.',
    );
    expect(alt).toContain('Money grew 1.15%; growth of 0.31% expected.');
    expect(alt).toContain('24 months');
    expect(caption).toContain(
      'Source: Costa Lirra monetary survey; Slackwater method 1.4. CC BY 4.0',
    );
    for (const words of [alt, caption]) expect(words).toContain(caution);
    expect(shortCaution).toBe(caution);
  });

  it('is drawn in the colours of its theme', async () => {
    const { svg: light } = await wideSvg(input(0.84), fonts);
    const { svg: dark } = await wideSvg(input(0.84, { theme: 'dark' }), fonts);
    expect(light).toContain(lightPalette.above);
    expect(dark).toContain(darkPalette.paper);
    const lightColours = Object.values(lightPalette).filter((colour) => dark.includes(colour));
    expect(lightColours).toEqual([]);
  });

  it('never cuts a figure in two when it shortens a title', async () => {
    const { blocks } = await wideSvg(cases['with a long title']!, fonts);
    const title = blocks.find(({ name }) => name === 'title')!;
    expect(title.text).toMatch(/…$/);
    const words = title.text.slice(0, -1).split(' ');
    expect(cases['with a long title']!.title.split(' ').slice(0, words.length)).toEqual(words);
  });

  it('draws ink for a level surprise', async () => {
    const { blocks } = await wideSvg(input(-0.03), fonts);
    const figure = blocks.find(({ name }) => name === 'figure')!;
    expect(figure.text).toBe('−0.03');
    expect(figure.fill).toBe(lightPalette.ink);
  });

  it('refuses a directory without fonts by name, and finds them once they are there', async () => {
    await expect(shareImage(input(0.84), '/nowhere')).rejects.toThrow('/nowhere');
    await expect(shareImage(input(0.84), '/nowhere')).rejects.toThrow('/nowhere');
  });
});

describe('growthWords', () => {
  it('says fell where money shrank, and names a fall that was expected', () => {
    expect(growthWords(-0.3205, 0.3892, {})).toBe('Money fell 0.32%; growth of 0.39% expected');
    expect(growthWords(0.1, -0.2, {})).toBe('Money grew 0.10%; a fall of 0.20% expected');
    expect(growthWords(0.001, 0, {})).toBe('Money did not change; no change expected');
    expect(growthWords(1, 1, { decimalMark: ',' })).toContain('1,01%');
  });
});

describe('textWidth', () => {
  it.each([400, 600] as const)('is what the shipped face of weight %i measures', async (weight) => {
    const faces = await loadFonts(fonts);
    for (const text of ['+0.84 pp', 'typical range, now ±0.45 pp', '−1.4%', 'Aug 2031', 'Q4']) {
      const block = { name: '', text, x: 0, baseline: 50, size: 100, fill: '#000' };
      const { width } = await measure({ ...block, family: 'Source Sans 3', weight }, faces);
      expect(Math.abs(textWidth(text, 100, weight) / width - 1), text).toBeLessThan(0.04);
    }
  });
});
