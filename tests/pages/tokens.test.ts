import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { cssPalette, darkPalette, lightPalette } from '../../src/lib/charts/palette.ts';

const css = readFileSync('src/styles/tokens.css', 'utf8');

/** The blocks of the style sheet that set tokens: light, dark by the system, dark by choice. */
const blocks = css.split(/(?=^:root|^@media)/m).filter((block) => block.includes('--paper:'));

function valueIn(block: string, reference: string): string | undefined {
  const name = /^var\((--[a-z0-9-]+)\)$/.exec(reference)?.[1];
  return new RegExp(`${name}: (#[0-9a-f]{6});`).exec(block)?.[1];
}

describe('the page’s colour tokens', () => {
  it('are set for light, for a dark system and for a remembered choice', () => {
    expect(blocks).toHaveLength(3);
  });

  it.each([
    ['light', 0, lightPalette],
    ['dark by the system', 1, darkPalette],
    ['dark by choice', 2, darkPalette],
  ] as const)('are the charts’ own: %s', (_, index, palette) => {
    for (const [token, reference] of Object.entries(cssPalette)) {
      const expected = palette[token as keyof typeof palette].toLowerCase();
      expect(valueIn(blocks[index]!, reference), token).toBe(expected);
    }
  });
});
