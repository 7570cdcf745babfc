import * as Plot from '@observablehq/plot';
import { labelSize } from './labels.ts';
import type { Label } from './labels.ts';
import type { DecimalMark } from './figures.ts';
import type { Palette } from './palette.ts';

export interface ChartOptions {
  /** Width to draw for, in px; text keeps its size at every width. */
  width: number;
  palette: Palette;
  /** Starts every id in the chart: unique on its page. */
  idPrefix: string;
  decimalMark?: DecimalMark;
  /** The document to draw in; the browser's own unless given (on a server: `serverDocument()`). */
  document?: Document;
}

export interface Chart {
  /** The whole `<svg>` element, without style attributes. */
  svg: string;
  width: number;
  height: number;
  /** Centre of the 1 px datum from the chart's top: a whole number and a half, so that the line is crisp. */
  datumY: number;
}

const namespace = 'http://www.w3.org/2000/svg';
const sans = 'Source Sans 3, sans-serif';

export interface Drawing {
  chart: ChartOptions;
  height: number;
  /** Text alternative: what is drawn and its values. */
  label: string;
  x: Plot.ScaleOptions;
  y: Plot.ScaleOptions;
  marks: Plot.Markish[];
  labels: Label[];
  /** Markup for `<defs>`. */
  defs?: string;
  /** Markup drawn over everything. */
  over?: string;
}

/** Draws Plot's marks with our labels over them, as the markup of an `<svg>` element. */
export function drawSvg(drawing: Drawing): string {
  const { chart, height, label, labels } = drawing;
  const defs = drawing.defs === undefined ? '' : `<defs>${drawing.defs}</defs>`;
  const { width } = chart;
  return (
    `<svg xmlns="${namespace}" role="img" aria-label="${escape(label)}" width="${width}" height="${height}"` +
    ` viewBox="0 0 ${width} ${height}" font-family="${sans}" font-size="${labelSize}">` +
    `${defs}${drawMarks(drawing)}${labels.map(labelMarkup).join('')}${drawing.over ?? ''}</svg>`
  );
}

/** Plot's marks alone, as markup; the axes are ours, so that text and placement are too. */
export function drawMarks(
  drawing: Pick<Drawing, 'chart' | 'height' | 'x' | 'y' | 'marks'>,
): string {
  const { chart, height, x, y, marks } = drawing;
  const document = chart.document ?? globalThis.document;
  if (document === undefined) throw new Error('Outside a browser a chart needs a document.');
  const plot = Plot.plot({
    document,
    width: chart.width,
    height,
    margin: 0,
    x: { axis: null, ...x },
    y: { axis: null, ...y },
    marks,
  });
  return [...plot.children]
    .filter(({ localName }) => localName !== 'style')
    .map(markup)
    .join('');
}

/** Plot moves strokes by half a pixel, but only on a screen of single density; our datum lies on the half already. */
const halfPixel = /^translate\(0(\.5)?,\s?0(\.5)?\)$/;

/**
 * Written out here and not by the document: the content policy forbids style attributes, a page may not
 * repeat Plot's class names, and coordinates of two places keep stored pages small and alike everywhere.
 */
function markup(element: Element): string {
  const attributes = [...element.attributes]
    .filter(({ name }) => !/^(style|class|aria-|xmlns)/.test(name))
    .filter(({ name, value }) => name !== 'transform' || !halfPixel.test(value))
    .sort((a, b) => (a.name < b.name ? -1 : 1))
    .map(({ name, value }) => ` ${name}="${escape(value.replace(/-?\d+\.\d+/g, twoPlaces))}"`)
    .join('');
  const inside = [...element.childNodes]
    .map((child) =>
      child.nodeType === 1 ? markup(child as Element) : escape(child.nodeValue ?? ''),
    )
    .join('');
  const name = element.localName;
  return inside === '' ? `<${name}${attributes}/>` : `<${name}${attributes}>${inside}</${name}>`;
}

function twoPlaces(number: string): string {
  return String(Math.round(Number(number) * 100) / 100);
}

function labelMarkup(label: Label): string {
  const { text, x, y, fill, anchor = 'start', size = labelSize, weight = 400, halo } = label;
  const place = `x="${twoPlaces(String(x))}" y="${twoPlaces(String(y))}"`;
  const anchored = anchor === 'start' ? '' : ` text-anchor="${anchor}"`;
  const sized = size === labelSize ? '' : ` font-size="${size}"`;
  const weighted = weight === 400 ? '' : ` font-weight="${weight}"`;
  const haloed =
    halo === undefined
      ? ''
      : ` stroke="${halo}" stroke-width="4" stroke-linejoin="round" paint-order="stroke"`;
  return `<text ${place} fill="${fill}"${anchored}${sized}${weighted}${haloed}>${escape(text)}</text>`;
}

/** Text or an attribute's value, safe inside markup. */
export function escape(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}
