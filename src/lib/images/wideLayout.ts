import type * as Plot from '@observablehq/plot';
import { periodLabel } from '../charts/figures.ts';
import type { Palette } from '../charts/palette.ts';
import type { SurpriseData } from '../charts/surpriseData.ts';
import type { ImageFont } from './fonts.ts';
import type { ShareImageInput } from './shareImage.ts';
import { fitSize, measure, shorten } from './typesetting.ts';
import type { TextBlock } from './typesetting.ts';
import { growthWords, shortCaution, sourceLine, typicalSize } from './words.ts';

export const wide = { width: 1200, height: 630 };

const margin = 60;
const right = wide.width - margin;

/** Where the chart is drawn, in px. */
export const chartZone = { left: 560, right, top: 236, bottom: 492 };

/** Where the figure and its unit must end, so that they stay clear of the chart. */
const figureEnd = chartZone.left - 24;

/** Height of Merriweather's figures, and of Source Sans's capitals, in em. */
const figureHeight = 0.743;
const capitalHeight = 0.66;

export interface WidePlan {
  palette: Palette;
  /** Whether the figure hangs from the datum, with its label above it. */
  hanging: boolean;
  figure: string;
  colour: string;
}

/** The datum lies lower under a figure that stands than over one that hangs: the label takes the other side. */
export function datumAt(hanging: boolean): number {
  return hanging ? 346 : 388;
}

/** Scales that keep every bar and the typical range in the zone, and the datum on the figure's. */
export function chartScale(
  { periods, surprise, forecast_se }: SurpriseData,
  hanging: boolean,
): { x: Plot.ScaleOptions; y: Plot.ScaleOptions; datumY: number; unitsPerPixel: number } {
  const datumY = datumAt(hanging);
  const errors = forecast_se.filter((error): error is number => error !== null);
  const values = surprise.filter((value): value is number => value !== null);
  const up = Math.max(0, ...values, ...errors);
  const down = Math.max(0, ...values.map((value) => -value), ...errors);
  const pixels = Math.min(
    (datumY - chartZone.top) / Math.max(up, 1e-3),
    (chartZone.bottom - datumY) / Math.max(down, 1e-3),
  );
  const high = (datumY - chartZone.top) / pixels;
  const low = (datumY - chartZone.bottom) / pixels;
  return {
    x: {
      type: 'linear',
      domain: [0, Math.max(periods.length, 1)],
      range: [chartZone.left, chartZone.right],
    },
    y: { type: 'linear', domain: [low, high], range: [chartZone.bottom, chartZone.top] },
    datumY,
    unitsPerPixel: 1 / pixels,
  };
}

/** Every piece of text of the wide image. */
export async function shareBlocks(
  input: ShareImageInput,
  plan: WidePlan,
  fonts: ImageFont[],
): Promise<TextBlock[]> {
  return [
    await heading(input, plan, fonts),
    await title(input, plan, fonts),
    ...(await figure(plan, fonts)),
    ...(await explanation(input, plan, fonts)),
    ...ends(input.history, plan),
    ...(await foot(input, plan, fonts)),
  ];
}

/** Whether a name still leaves what is made of it no wider than `room`. */
function oneLine(
  block: TextBlock,
  whole: (name: string) => string,
  room: number,
  fonts: ImageFont[],
): (name: string) => Promise<boolean> {
  return async (name) => (await measure({ ...block, text: whole(name) }, fonts)).width <= room;
}

async function heading(
  { economy, period }: ShareImageInput,
  { palette }: WidePlan,
  fonts: ImageFont[],
): Promise<TextBlock> {
  const block: TextBlock = {
    name: 'heading',
    text: '',
    x: margin,
    baseline: 78,
    size: 26,
    family: 'Source Sans 3',
    weight: 600,
    fill: palette.ink,
  };
  const whole = (name: string) => `${name}, ${periodLabel(period)}`;
  const fits = oneLine(block, whole, right - margin, fonts);
  return { ...block, text: whole(await shorten(economy, fits)) };
}

/** Two lines: first of a comfortable width, then of the whole, then smaller, and at last cut with an ellipsis. */
async function title(
  input: ShareImageInput,
  { palette }: WidePlan,
  fonts: ImageFont[],
): Promise<TextBlock> {
  const block: TextBlock = {
    name: 'title',
    text: input.title,
    x: margin,
    baseline: 138,
    size: 46,
    family: 'Merriweather',
    weight: 700,
    fill: palette.ink,
  };
  const shapes = [
    { size: 46, width: 860, lineHeight: 55 },
    { size: 46, width: right - margin, lineHeight: 55 },
    { size: 38, width: right - margin, lineHeight: 48 },
  ];
  const fits = async (shaped: TextBlock) =>
    (await measure(shaped, fonts)).height <= 2 * (shaped.lineHeight ?? 0) + 1;
  for (const shape of shapes) {
    const shaped = { ...block, ...shape, letterSpacing: -0.014 * shape.size };
    if (await fits(shaped)) return shaped;
  }
  const smallest = shapes.at(-1)!;
  const last = { ...block, ...smallest, letterSpacing: -0.014 * smallest.size };
  return { ...last, text: await shorten(input.title, (text) => fits({ ...last, text })) };
}

async function figure(plan: WidePlan, fonts: ImageFont[]): Promise<TextBlock[]> {
  const { palette, hanging, colour } = plan;
  const unitRoom = 40;
  const fitted = await fitSize(
    {
      name: 'figure',
      text: plan.figure,
      x: margin,
      baseline: 0,
      size: 150,
      family: 'Merriweather',
      weight: 300,
      fill: colour,
    },
    [150, 140, 132, 116, 100, 84, 68],
    figureEnd - margin - unitRoom,
    fonts,
  );
  const { size } = fitted.block;
  // The signs have wide bearings: moved left, their ink stands near the margin.
  const x = margin - 0.06 * size;
  const top = datumAt(hanging) - (hanging ? 0 : figureHeight * size);
  const baseline = top + figureHeight * size;
  const unitSize = 36;
  return [
    { ...fitted.block, x, baseline, letterSpacing: -0.01 * size },
    {
      name: 'unit',
      text: 'pp',
      x: x + fitted.width + 8,
      baseline: hanging ? baseline : top + capitalHeight * unitSize,
      size: unitSize,
      family: 'Source Sans 3',
      weight: 400,
      fill: palette.ink2,
    },
  ];
}

/** The unit in words, actual and expected growth, and what the shading is: on the figure's other side. */
async function explanation(
  input: ShareImageInput,
  plan: WidePlan,
  fonts: ImageFont[],
): Promise<TextBlock[]> {
  const { palette, hanging } = plan;
  const { growth, expected, forecast_se } = input;
  const lines = ['Money surprise, percentage points', growthWords(growth, expected, input)];
  if (forecast_se !== null) {
    lines.push(`Shaded: typical range, now ${typicalSize(forecast_se, input)}`);
  }
  const datum = datumAt(hanging);
  // A decimal comma reaches below the datum that its figure stands on.
  const below = plan.figure.includes(',') ? 64 : 42;
  const first = hanging ? datum - 18 - 30 * (lines.length - 1) : datum + below;
  return Promise.all(
    lines.map(async (text, i) => {
      const block: TextBlock = {
        name: `explanation ${i + 1}`,
        text,
        x: margin,
        baseline: first + 30 * i,
        size: 23,
        family: 'Source Sans 3',
        weight: i === 0 ? 600 : 400,
        fill: i === 0 ? palette.ink : palette.ink2,
      };
      return (await fitSize(block, [23, 21, 19], figureEnd - margin, fonts)).block;
    }),
  );
}

/** Names of the first and the last period under the chart. */
function ends({ periods }: SurpriseData, { palette }: WidePlan): TextBlock[] {
  const first = periods[0];
  const last = periods.at(-1);
  if (first === undefined || last === undefined) return [];
  const common = { baseline: 522, size: 22, family: 'Source Sans 3' } as const;
  const lastBlock: TextBlock = {
    ...common,
    name: 'last period',
    text: periodLabel(last, 'short'),
    x: chartZone.right,
    anchor: 'end',
    weight: 600,
    fill: palette.ink,
  };
  if (first === last) return [lastBlock];
  const firstBlock: TextBlock = {
    ...common,
    name: 'first period',
    text: periodLabel(first, 'short'),
    x: chartZone.left,
    weight: 400,
    fill: palette.ink2,
  };
  return [firstBlock, lastBlock];
}

async function foot(
  { source, methodVersion }: ShareImageInput,
  { palette }: WidePlan,
  fonts: ImageFont[],
): Promise<TextBlock[]> {
  const x = 248;
  const sourceBlock: TextBlock = {
    name: 'source',
    text: '',
    x,
    baseline: 590,
    size: 19,
    family: 'Source Sans 3',
    weight: 400,
    fill: palette.ink2,
  };
  const whole = (named: string) => sourceLine(named, methodVersion);
  return [
    {
      name: 'wordmark',
      text: 'Slackwater',
      x: margin,
      baseline: 590,
      size: 28,
      family: 'Merriweather',
      weight: 700,
      fill: palette.ink,
      letterSpacing: -0.018 * 28,
    },
    {
      ...sourceBlock,
      name: 'caution',
      text: shortCaution,
      baseline: 565,
      weight: 600,
      fill: palette.ink,
    },
    {
      ...sourceBlock,
      text: whole(await shorten(source, oneLine(sourceBlock, whole, right - x, fonts))),
    },
  ];
}
