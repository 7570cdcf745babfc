import { createHash } from 'node:crypto';
import { readFile, readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));

/** All that the built site is made of. */
const SOURCES = [
  'src',
  'api',
  'db',
  'seed',
  'public',
  'astro.config.mjs',
  'package.json',
  'package-lock.json',
  'tsconfig.json',
];

/** Hash of the sources' contents (never their times: a clone's are all new), 16 hexadecimal digits. */
export async function buildId() {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    for (const file of await filesUnder(source)) {
      hash
        .update(`${file}\0`)
        .update(await readFile(join(ROOT, file)))
        .update('\0');
    }
  }
  return hash.digest('hex').slice(0, 16);
}

async function filesUnder(path) {
  let entries;
  try {
    entries = await readdir(join(ROOT, path), { withFileTypes: true });
  } catch (error) {
    if (error.code === 'ENOTDIR') return [path];
    if (error.code === 'ENOENT') return [];
    throw error;
  }
  const nested = await Promise.all(
    entries.map((entry) => {
      const inner = join(path, entry.name);
      return entry.isDirectory() ? filesUnder(inner) : [inner];
    }),
  );
  return nested.flat().sort();
}
