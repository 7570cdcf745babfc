import { describe, expect, it } from 'vitest';
import { codePoints, unicodeRange } from '../../src/lib/fonts/ranges.mjs';

describe('unicode ranges', () => {
  it('are read and written alike', () => {
    const range = 'U+20-7E,U+A0,U+B0-B3,U+2212';
    expect(unicodeRange(codePoints(range))).toBe(range);
  });

  it('join neighbours whatever their order', () => {
    expect(unicodeRange([67, 65, 66, 66, 70])).toBe('U+41-43,U+46');
  });
});
