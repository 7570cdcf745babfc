import { readFile } from 'node:fs/promises';
import path from 'node:path';
import type { FontWeight } from 'satori';

export interface ImageFont {
  name: string;
  weight: FontWeight;
  style: 'normal';
  data: Buffer;
}

/** Names of economies and sources may need letters beyond the basic slice; the later slices fill its holes. */
const slices = {
  Merriweather: ['latin', 'latin-ext', 'cyrillic', 'cyrillic-ext', 'vietnamese'],
  'Source Sans 3': ['latin', 'latin-ext', 'cyrillic', 'cyrillic-ext', 'vietnamese', 'greek'],
};

export type Family = keyof typeof slices;

interface Face {
  family: Family;
  folder: string;
  weight: FontWeight;
}

const faces: Face[] = [
  { family: 'Merriweather', folder: 'merriweather', weight: 300 },
  { family: 'Merriweather', folder: 'merriweather', weight: 700 },
  { family: 'Source Sans 3', folder: 'source-sans-3', weight: 400 },
  { family: 'Source Sans 3', folder: 'source-sans-3', weight: 600 },
];

/** The slices have names of their own: of two faces with one name and weight only the first would be used. */
function sliceName(family: Family, slice: string): string {
  return slice === 'latin' ? family : `${family} ${slice}`;
}

/** A family with its slices in their order, as a `font-family`. */
export function familyNames(family: Family): string {
  return slices[family].map((slice) => sliceName(family, slice)).join(', ');
}

const loaded = new Map<string, Promise<ImageFont[]>>();

/**
 * The faces that images are set in, read once from `directory`: the folder of the @fontsource packages.
 * It is passed in because a bundled module does not know where the packages lie.
 */
export function loadFonts(directory: string): Promise<ImageFont[]> {
  const known = loaded.get(directory);
  if (known !== undefined) return known;
  const reading = Promise.all(
    faces.flatMap((face) => slices[face.family].map((slice) => readFace(directory, face, slice))),
  );
  // A failed reading is forgotten, so that a directory that appears later is found.
  reading.catch(() => loaded.delete(directory));
  loaded.set(directory, reading);
  return reading;
}

async function readFace(directory: string, face: Face, slice: string): Promise<ImageFont> {
  const { family, folder, weight } = face;
  const file = path.join(directory, folder, 'files', `${folder}-${slice}-${weight}-normal.woff`);
  return { name: sliceName(family, slice), weight, style: 'normal', data: await readFile(file) };
}
