import { zipSync } from 'fflate';
import { sha256 } from './store.ts';

// A zip keeps a local time without a zone; a fixed one makes the same content the same bytes, wherever it is made.
const MADE = new Date(1980, 0, 1);

/** The files of a release in one zip, with `SHA256SUMS` to check them by; the same files give the same bytes. */
export function bundleOf(files: { name: string; bytes: Uint8Array }[]): Uint8Array {
  const sorted = files.toSorted((a, b) => (a.name < b.name ? -1 : 1));
  const sums = sorted.map(({ name, bytes }) => `${sha256(bytes)}  ${name}\n`).join('');
  const entries = [...sorted, { name: 'SHA256SUMS', bytes: new TextEncoder().encode(sums) }];
  return zipSync(Object.fromEntries(entries.map(({ name, bytes }) => [name, bytes])), {
    mtime: MADE,
    level: 6,
  });
}
