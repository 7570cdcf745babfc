import { range, signed, unsigned } from '../src/lib/charts/figures.ts';

/** A name as it stands first in a sentence: "The Brannoch Isles". */
export function atStart(nameInText: string): string {
  return nameInText.charAt(0).toUpperCase() + nameInText.slice(1);
}

/** The possessive: "Aldermark’s", "the Brannoch Isles’". */
export function possessive(nameInText: string): string {
  return nameInText.endsWith('s') ? `${nameInText}’` : `${nameInText}’s`;
}

const counts = 'no one two three four five six seven eight nine ten eleven twelve'.split(' ');
const places =
  'no first second third fourth fifth sixth seventh eighth ninth tenth eleventh twelfth'.split(' ');

/** A count in prose: in words up to twelve. */
export function countInWords(count: number): string {
  return counts[count] ?? String(count);
}

/** A place in a row, in words, up to twelve; null beyond. */
export function placeInWords(place: number): string | null {
  return places[place] ?? null;
}

/** The size of a surprise in prose, without its sign: "0.84 points". */
export function points(value: number): string {
  return `${unsigned(Math.abs(value), 2)} points`;
}

/** A size in per cent in prose, without its sign: "0.6 per cent". */
export function perCent(value: number, decimals: number): string {
  return `${unsigned(Math.abs(value), decimals)} per cent`;
}

/** A signed figure in log points: "+0.27 log points". */
export function logPoints(value: number): string {
  return `${signed(value, 2)} log points`;
}

/** Both ends of a band in prose: "+0.2 to +1.0 per cent". */
export function bandInWords(lower: number, upper: number): string {
  return `${range(lower, upper)} per cent`;
}

/** One of the forms, always the same for the same key. */
export function pick<T>(key: string, forms: readonly [T, ...T[]]): T {
  let hash = 0;
  for (const character of key) hash = (Math.imul(hash, 31) + character.charCodeAt(0)) >>> 0;
  return forms[hash % forms.length] ?? forms[0];
}
