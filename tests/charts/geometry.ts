import { parseHTML } from 'linkedom';
import { labelBox, overlap } from '../../src/lib/charts/labels.ts';
import type { Box } from '../../src/lib/charts/labels.ts';

export function parse(svg: string): Element {
  return parseHTML(`<html><body>${svg}</body></html>`).document.querySelector('svg')!;
}

export interface Named {
  text: string;
  box: Box;
}

/** Every label in a Source Sans chart with the room it takes. */
export function labels(svg: string): Named[] {
  return [...parse(svg).querySelectorAll('text')].map((element) => {
    const number = (name: string, otherwise: number) =>
      Number(element.getAttribute(name) ?? otherwise);
    const text = element.textContent ?? '';
    const anchor = (element.getAttribute('text-anchor') ?? 'start') as 'start' | 'middle' | 'end';
    const weight = number('font-weight', 400) === 600 ? 600 : 400;
    const size = number('font-size', 13);
    const place = { text, x: number('x', 0), y: number('y', 0), fill: '' };
    return { text, box: labelBox({ ...place, anchor, weight, size }) };
  });
}

export interface Bar {
  fill: string;
  box: Box;
}

/** Every bar: Plot hands the fill to the group where all bars share it. */
export function bars(svg: string): Bar[] {
  return [...parse(svg).querySelectorAll('rect')].map((element) => {
    const number = (name: string) => Number(element.getAttribute(name));
    const left = number('x');
    const top = number('y');
    const fill =
      element.getAttribute('fill') ?? element.parentElement?.getAttribute('fill') ?? 'none';
    return {
      fill,
      box: { left, right: left + number('width'), top, bottom: top + number('height') },
    };
  });
}

/** Pairs of labels that touch, by their texts. */
export function collisions(named: Named[]): string[] {
  return named.flatMap((a, i) =>
    named
      .slice(i + 1)
      .filter((b) => overlap(a.box, b.box))
      .map((b) => `${a.text} × ${b.text}`),
  );
}
