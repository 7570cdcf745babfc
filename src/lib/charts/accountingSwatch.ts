import { hatchPattern } from './inflationParts.ts';
import type { PartName } from './inflationParts.ts';
import type { Palette } from './palette.ts';

/**
 * The mark of a part of the accounting, or of inflation, 16 px square, for a list of figures that names it in words;
 * so it has no alternative text. `idPrefix` is unique on the page.
 */
export function accountingSwatch(
  part: PartName | 'actual',
  { palette, idPrefix }: { palette: Palette; idPrefix: string },
): string {
  const hatch = `${idPrefix}-hatch`;
  const outline = `x="0.5" y="0.5" width="15" height="15" stroke="${palette.ink2}"`;
  const marks: Record<typeof part, string> = {
    expected_money: `<rect width="16" height="16" fill="${palette.solid}"/>`,
    current_surprise:
      `<rect width="8" height="16" fill="${palette.above}"/>` +
      `<rect x="8" width="8" height="16" fill="${palette.below}"/>`,
    carry_over: `<defs>${hatchPattern(hatch, palette)}</defs><rect ${outline} fill="url(#${hatch})"/>`,
    unexplained: `<rect ${outline} fill="none" stroke-dasharray="3 2"/>`,
    actual: `<rect y="6.5" width="16" height="3" fill="${palette.ink}"/>`,
  };
  return `<svg xmlns="http://www.w3.org/2000/svg" aria-hidden="true" width="16" height="16" viewBox="0 0 16 16">${marks[part]}</svg>`;
}
