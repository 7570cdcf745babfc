import { copyFile, mkdir, readFile, readdir } from 'node:fs/promises';
import { dirname, extname, join, relative } from 'node:path';
import { sha256 } from '../publication/store.ts';

/** A file of the build: styles, scripts, fonts, icons. */
export interface Asset {
  bytes: Uint8Array;
  mediaType: string;
  cacheControl: string;
  etag: string;
}

const MEDIA_TYPES: Record<string, string> = {
  '.css': 'text/css; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.ico': 'image/x-icon',
  '.txt': 'text/plain; charset=utf-8',
  '.woff2': 'font/woff2',
  '.woff': 'font/woff',
  '.json': 'application/json',
};

/**
 * All files of the build, by address. Those with a hash in their name are kept in `archive` besides, and those of
 * earlier builds are answered from there: a stored page may still ask for them.
 */
export async function loadAssets(client: string, archive: string): Promise<Map<string, Asset>> {
  for (const file of await filesUnder(join(client, '_astro'))) {
    const kept = join(archive, relative(client, file));
    await mkdir(dirname(kept), { recursive: true });
    await copyFile(file, kept);
  }
  const assets = new Map<string, Asset>();
  for (const folder of [archive, client]) {
    for (const file of await filesUnder(folder)) {
      const address = `/${relative(folder, file).split('\\').join('/')}`;
      const bytes = await readFile(file);
      assets.set(address, {
        bytes,
        mediaType: MEDIA_TYPES[extname(file)] ?? 'application/octet-stream',
        cacheControl: address.startsWith('/_astro/')
          ? 'public, max-age=31536000, immutable'
          : 'public, max-age=3600',
        etag: `"${sha256(bytes).slice(0, 32)}"`,
      });
    }
  }
  return assets;
}

async function filesUnder(folder: string): Promise<string[]> {
  try {
    const entries = await readdir(folder, { withFileTypes: true, recursive: true });
    return entries
      .filter((entry) => entry.isFile())
      .map((entry) => join(entry.parentPath, entry.name));
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return [];
    throw error;
  }
}
