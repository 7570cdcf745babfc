import satori from 'satori';
import { familyNames } from './fonts.ts';
import type { Family, ImageFont } from './fonts.ts';

/** One piece of text in an image; every length in px. */
export interface TextBlock {
  /** What it is, for checks of the layout. */
  name: string;
  text: string;
  x: number;
  /** Baseline of the (first) line. */
  baseline: number;
  size: number;
  family: Family;
  weight: 300 | 400 | 600 | 700;
  fill: string;
  /** Whether `x` is where the text starts or where it ends. */
  anchor?: 'start' | 'end';
  letterSpacing?: number;
  /** Breaks into lines of this width, `lineHeight` apart; one line without it. */
  width?: number;
  lineHeight?: number;
}

/** Ascent less descent, in em, as the shipped files say: where a line's baseline lies in its box. */
const ascentLessDescent: Record<Family, number> = {
  Merriweather: (1968 - 546) / 2000,
  'Source Sans 3': (1024 - 400) / 1000,
};

interface Element {
  type: 'div';
  props: { style: Record<string, string | number>; children?: string | Element[] };
}

function element(block: TextBlock, canvas: number): Element {
  const { text, x, baseline, size, family, weight, fill, anchor, width } = block;
  const lineHeight = block.lineHeight ?? Math.ceil(size * 1.2);
  const top = baseline - lineHeight / 2 - (ascentLessDescent[family] / 2) * size;
  const style: Record<string, string | number> = {
    position: 'absolute',
    top,
    fontFamily: familyNames(family),
    fontSize: size,
    fontWeight: weight,
    lineHeight: `${lineHeight}px`,
    color: fill,
    ...(anchor === 'end' ? { right: canvas - x } : { left: x }),
    ...(width === undefined ? { whiteSpace: 'nowrap' } : { width, wordBreak: 'break-word' }),
    ...(block.letterSpacing === undefined ? {} : { letterSpacing: block.letterSpacing }),
  };
  return { type: 'div', props: { style, children: text } };
}

/** Sets blocks as paths, in an `<svg>` of the canvas's size. */
export async function typeset(
  blocks: TextBlock[],
  canvas: { width: number; height: number },
  fonts: ImageFont[],
): Promise<string> {
  const root: Element = {
    type: 'div',
    props: {
      style: { display: 'flex', width: canvas.width, height: canvas.height },
      children: blocks.map((block) => element(block, canvas.width)),
    },
  };
  const svg = await satori(root as never, { ...canvas, fonts });
  // Each block comes with a mask that nothing refers to, under an id that every image would repeat.
  return svg.replace(/<mask [^>]*>.*?<\/mask>/g, '');
}

/** Width and height that a block takes, in px. */
export async function measure(
  block: TextBlock,
  fonts: ImageFont[],
): Promise<{ width: number; height: number }> {
  let size = { width: 0, height: 0 };
  const canvas = { width: 4000, height: 600 };
  const root: Element = {
    type: 'div',
    props: { style: { display: 'flex', ...canvas }, children: [element(block, canvas.width)] },
  };
  await satori(root as never, {
    ...canvas,
    fonts,
    onNodeDetected: ({ textContent, width, height }) => {
      if (textContent !== undefined && width < canvas.width) size = { width, height };
    },
  });
  return size;
}

/** The block at the largest of `sizes` at which it is no wider than `room`; the last of them where none fits. */
export async function fitSize(
  block: TextBlock,
  sizes: number[],
  room: number,
  fonts: ImageFont[],
): Promise<{ block: TextBlock; width: number }> {
  let fitted = { block, width: 0 };
  for (const size of sizes) {
    const candidate = { ...block, size };
    fitted = { block: candidate, width: (await measure(candidate, fonts)).width };
    if (fitted.width <= room) break;
  }
  return fitted;
}

/**
 * `text`, or as many of its first words as fit and an ellipsis; letters only where not even one word fits.
 * A figure is so never cut in two.
 */
export async function shorten(
  text: string,
  fits: (text: string) => Promise<boolean>,
): Promise<string> {
  if (await fits(text)) return text;
  const words = text.split(' ');
  const cut = (parts: string[], joint: string, kept: number) =>
    `${parts
      .slice(0, kept)
      .join(joint)
      .replace(/[\s,;:.]+$/, '')}…`;
  const most = async (parts: string[], joint: string) => {
    let kept = 0;
    let over = parts.length;
    while (over - kept > 1) {
      const middle = (kept + over) >> 1;
      if (await fits(cut(parts, joint, middle))) kept = middle;
      else over = middle;
    }
    return kept;
  };
  const kept = await most(words, ' ');
  if (kept > 0) return cut(words, ' ', kept);
  const letters = [...text];
  return cut(letters, '', await most(letters, ''));
}
