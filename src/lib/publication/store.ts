import { createHash, randomUUID } from 'node:crypto';
import { mkdir, open, readFile, rename, stat } from 'node:fs/promises';
import { dirname, join } from 'node:path';

/** Encodings an artefact may be kept in beside its own bytes. */
export type Encoding = 'identity' | 'br' | 'gzip';

/** Bytes kept under their own SHA-256: writing the same bytes twice is one file, and nothing is ever overwritten. */
export interface ArtefactStore {
  /** Keeps the bytes and answers their hash (hex). Safe against a crash: wholly there or not at all. */
  put(bytes: Uint8Array): Promise<string>;
  /** Keeps a compressed form of the artefact beside it. */
  putEncoded(hash: string, encoding: 'br' | 'gzip', bytes: Uint8Array): Promise<void>;
  /** The bytes in that encoding, or null where they are not kept. */
  get(hash: string, encoding?: Encoding): Promise<Uint8Array | null>;
}

const SUFFIX: Record<Encoding, string> = { identity: '', br: '.br', gzip: '.gz' };

/** An artefact store in a folder, two levels deep so that no folder grows without bound. */
export function folderStore(folder: string): ArtefactStore {
  const path = (hash: string, encoding: Encoding) =>
    join(folder, hash.slice(0, 2), hash.slice(2, 4), hash + SUFFIX[encoding]);
  return {
    async put(bytes) {
      const hash = sha256(bytes);
      await write(path(hash, 'identity'), bytes);
      return hash;
    },
    putEncoded: (hash, encoding, bytes) => write(path(hash, encoding), bytes),
    async get(hash, encoding = 'identity') {
      try {
        return await readFile(path(hash, encoding));
      } catch (error) {
        if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
        throw error;
      }
    },
  };
}

/** SHA-256 in hexadecimal. */
export function sha256(bytes: Uint8Array | string): string {
  return createHash('sha256').update(bytes).digest('hex');
}

/** Temporary name, fsync, rename, fsync of the folder: after a crash the file is whole or absent. */
async function write(path: string, bytes: Uint8Array): Promise<void> {
  if (await exists(path)) return;
  const folder = dirname(path);
  await mkdir(folder, { recursive: true });
  const temporary = join(folder, `.${randomUUID()}`);
  const file = await open(temporary, 'wx');
  try {
    await file.writeFile(bytes);
    await file.sync();
  } finally {
    await file.close();
  }
  await rename(temporary, path);
  const directory = await open(folder, 'r');
  try {
    await directory.sync();
  } finally {
    await directory.close();
  }
}

async function exists(path: string): Promise<boolean> {
  return stat(path).then(
    () => true,
    () => false,
  );
}
