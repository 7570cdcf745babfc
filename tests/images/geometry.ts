import type { Box } from '../../src/lib/charts/labels.ts';

/** Boxes of an image's blocks of text, in the blocks' order: every one is set as one path of absolute coordinates. */
export function textBoxes(svg: string): Box[] {
  const afterMarks = svg.slice(svg.lastIndexOf('<rect', svg.indexOf('<path fill="')));
  return [...afterMarks.matchAll(/<path fill="[^"]+" d="([^"]+)"/g)].map(([, d]) => pathBox(d!));
}

function pathBox(d: string): Box {
  if (/[a-z]/.test(d.replaceAll('Z', ''))) throw new Error('A path with relative coordinates.');
  const numbers = [...d.matchAll(/-?\d+(?:\.\d+)?/g)].map(([number]) => Number(number));
  const xs = numbers.filter((_, i) => i % 2 === 0);
  const ys = numbers.filter((_, i) => i % 2 === 1);
  return {
    left: Math.min(...xs),
    right: Math.max(...xs),
    top: Math.min(...ys),
    bottom: Math.max(...ys),
  };
}

/** The bars' boxes: all rectangles but the paper and the datum. */
export function barBoxes(svg: string): Box[] {
  return [...svg.matchAll(/<rect [^>]*>/g)]
    .map(([tag]) => {
      const number = (name: string) =>
        Number(new RegExp(` ${name}="([^"]+)"`).exec(tag)?.[1] ?? '0');
      return { x: number('x'), y: number('y'), width: number('width'), height: number('height') };
    })
    .filter(({ width }) => width < 1200)
    .map(({ x, y, width, height }) => {
      return { left: x, right: x + width, top: y, bottom: y + height };
    });
}
