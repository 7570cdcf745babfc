import { readFile } from 'node:fs/promises';
import path from 'node:path';
import type { FontWeight } from 'satori';

export interface ImageFont {
  name: string;
  weight: FontWeight;
  style: 'normal';
  data: Buffer;
}

interface Face {
  name: string;
  folder: string;
  weight: FontWeight;
}

const faces: Face[] = [
  { name: 'Merriweather', folder: 'merriweather', weight: 300 },
  { name: 'Merriweather', folder: 'merriweather', weight: 700 },
  { name: 'Source Sans 3', folder: 'source-sans-3', weight: 400 },
  { name: 'Source Sans 3', folder: 'source-sans-3', weight: 600 },
];

/** Names of economies and sources may need letters beyond the basic slice; the later slices fill its holes. */
const slices = ['latin', 'latin-ext', 'cyrillic', 'vietnamese'];

const loaded = new Map<string, Promise<ImageFont[]>>();

/**
 * The faces that images are set in, read once from `directory`: the folder of the @fontsource packages.
 * It is passed in because a bundled module does not know where the packages lie.
 */
export function loadFonts(directory: string): Promise<ImageFont[]> {
  const known = loaded.get(directory);
  if (known !== undefined) return known;
  const reading = Promise.all(
    slices.flatMap((slice) => faces.map((face) => readFace(directory, face, slice))),
  );
  // A failed reading is forgotten, so that a directory that appears later is found.
  reading.catch(() => loaded.delete(directory));
  loaded.set(directory, reading);
  return reading;
}

async function readFace(directory: string, face: Face, slice: string): Promise<ImageFont> {
  const { name, folder, weight } = face;
  const file = path.join(directory, folder, 'files', `${folder}-${slice}-${weight}-normal.woff`);
  // The slices have names of their own: of two faces with one name and weight only the first is ever used.
  const named = slice === slices[0] ? name : `${name} ${slice}`;
  return { name: named, weight, style: 'normal', data: await readFile(file) };
}
