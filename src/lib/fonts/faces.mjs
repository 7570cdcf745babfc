/**
 * The faces the site ships, with what stands in for each until it has arrived. `fallbackWidth` is the face's
 * mean letter width over that of the stand-in, both weighted by how often letters occur in English and read
 * from the shipped files and from Liberation's (which has the widths of Times New Roman, Arial and Courier New).
 */
export const faces = [
  serif(300, 0.4798 / 0.4052, 'regular'),
  serif(400, 0.4887 / 0.4052, 'regular'),
  serif(700, 0.5024 / 0.4317, 'bold'),
  sans(400, 0.4235 / 0.4471, 'regular'),
  sans(600, 0.4362 / 0.4841, 'bold'),
  {
    family: 'Source Code Pro',
    package: 'source-code-pro',
    weight: 400,
    ascent: 0.984,
    descent: 0.273,
    fallback: ['Courier New', 'Liberation Mono'],
    fallbackWidth: 1,
    scripts: ['latin', 'latin-ext'],
  },
];

/** @param {number} weight @param {number} fallbackWidth @param {'regular' | 'bold'} cut */
function serif(weight, fallbackWidth, cut) {
  return {
    family: 'Merriweather',
    package: 'merriweather',
    weight,
    ascent: 0.984,
    descent: 0.273,
    fallback:
      cut === 'bold'
        ? ['Times New Roman Bold', 'TimesNewRomanPS-BoldMT', 'Liberation Serif Bold']
        : ['Times New Roman', 'TimesNewRomanPSMT', 'Liberation Serif'],
    fallbackWidth,
    scripts: ['latin', 'latin-ext'],
  };
}

/** @param {number} weight @param {number} fallbackWidth @param {'regular' | 'bold'} cut */
function sans(weight, fallbackWidth, cut) {
  return {
    family: 'Source Sans 3',
    package: 'source-sans-3',
    weight,
    ascent: 1.024,
    descent: 0.4,
    fallback:
      cut === 'bold'
        ? ['Arial Bold', 'Arial-BoldMT', 'Liberation Sans Bold']
        : ['Arial', 'ArialMT', 'Liberation Sans'],
    fallbackWidth,
    scripts: ['latin', 'latin-ext', 'greek'],
  };
}

/** What nearly every page needs: ASCII, the no-break space and the house's signs. */
export const basicCharacters =
  Array.from({ length: 95 }, (_, i) => String.fromCodePoint(32 + i)).join('') +
  '\u00a0\u2212–—‘’“”·±×éÉ…§©°²³½£€';

/** Kept in the slices: figures and ligatures as the type rules need them, nothing for small capitals or swashes. */
export const keptFeatures = [
  'calt',
  'ccmp',
  'kern',
  'liga',
  'lnum',
  'locl',
  'mark',
  'pnum',
  'tnum',
];
