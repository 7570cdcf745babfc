import { Resvg } from '@resvg/resvg-js';
import { hangs, side, surpriseFigure } from '../charts/figures.ts';
import type { DecimalMark } from '../charts/figures.ts';
import { palettes } from '../charts/palette.ts';
import type { Palette, Theme } from '../charts/palette.ts';
import { serverDocument } from '../charts/serverDocument.ts';
import type { SurpriseData } from '../charts/surpriseData.ts';
import { barMarks, rangeMarks } from '../charts/surpriseMarks.ts';
import { drawMarks, escape } from '../charts/svg.ts';
import { loadFonts } from './fonts.ts';
import { chartScale, shareBlocks, wide } from './wideLayout.ts';
import type { WidePlan } from './wideLayout.ts';
import { typeset } from './typesetting.ts';
import type { TextBlock } from './typesetting.ts';
import { alternativeText, captionText } from './words.ts';

export interface ShareImageInput {
  economy: string;
  /** ISO 8601: `2031-08`, `2000-Q4`, `1970`. */
  period: string;
  title: string;
  /** The surprise of the period, its money growth, what was expected, and the forecast standard error: log points. */
  surprise: number;
  growth: number;
  expected: number;
  forecast_se: number | null;
  /** The periods to draw, up to and including `period`; the last 24 of them are. */
  history: SurpriseData;
  /** Who published the data: "Costa Lirra monetary survey". */
  source: string;
  methodVersion: string;
  theme?: Theme;
  decimalMark?: DecimalMark;
}

export interface ShareImage {
  /** 1200 × 630; all text as paths. */
  svg: string;
  png: Uint8Array;
  /** Text alternative. */
  alt: string;
  caption: string;
}

/** The figure's place and colour. */
function plan(input: ShareImageInput, palette: Palette): WidePlan {
  const where = side(input.surprise);
  return {
    palette,
    hanging: hangs(input.surprise, 2),
    figure: surpriseFigure(input.surprise, input),
    colour: where === 'level' ? palette.ink : palette[where],
  };
}

/** The input with no more of its history than is drawn. */
function withLastTwoYears(input: ShareImageInput): ShareImageInput {
  const { periods, surprise, forecast_se } = input.history;
  const history = {
    periods: periods.slice(-24),
    surprise: surprise.slice(-24),
    forecast_se: forecast_se.slice(-24),
  };
  return { ...input, history };
}

/** The wide image as SVG, with the blocks of text it holds. */
export async function wideSvg(
  given: ShareImageInput,
  fontDirectory: string,
): Promise<{ svg: string; blocks: TextBlock[] }> {
  const input = withLastTwoYears(given);
  const { history } = input;
  const palette = palettes[input.theme ?? 'light'];
  const planned = plan(input, palette);
  const fonts = await loadFonts(fontDirectory);
  const blocks = await shareBlocks(input, planned, fonts);
  const text = await typeset(blocks, wide, fonts);
  const scale = chartScale(history, planned.hanging);
  const chart = { document: serverDocument(), palette, width: wide.width, idPrefix: 'share' };
  const marks = drawMarks({
    chart,
    height: wide.height,
    ...scale,
    marks: [...rangeMarks(history, palette), ...barMarks(history, palette, scale.unitsPerPixel)],
  });
  const paper = `<rect width="${wide.width}" height="${wide.height}" fill="${palette.paper}"/>`;
  const datum = `<rect y="${scale.datumY - 1}" width="${wide.width}" height="2" fill="${palette.ink}"/>`;
  const label = `role="img" aria-label="${escape(alternativeText(input))}" `;
  const svg = text
    .replace(/^<svg ([^>]*)>/, (_, rest: string) => `<svg ${label}${rest}>${paper}${marks}`)
    .replace(/<\/svg>$/, `${datum}</svg>`);
  return { svg, blocks };
}

/**
 * The wide share image of a money surprise, 1200 × 630. The words are set as paths, so that neither a browser nor
 * the converter needs a font. `fontDirectory` is the folder of the @fontsource packages.
 */
export async function shareImage(
  given: ShareImageInput,
  fontDirectory: string,
): Promise<ShareImage> {
  const input = withLastTwoYears(given);
  const { svg } = await wideSvg(input, fontDirectory);
  const png = new Resvg(svg, { font: { loadSystemFonts: false } }).render().asPng();
  return { svg, png, alt: alternativeText(input), caption: captionText(input) };
}
