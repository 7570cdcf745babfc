import { promisify } from 'node:util';
import { brotliCompress, constants, gzip } from 'node:zlib';

export type Encoding = 'br' | 'gzip';

const compressBrotli = promisify(brotliCompress);
const compressGzip = promisify(gzip);

/** Below this a compressed answer is hardly smaller. */
const SMALLEST = 1_024;
const BROTLI_QUALITY = 5;

/** The better encoding that the caller takes for so many bytes; null for none. */
export function encodingFor(header: string | undefined, size: number): Encoding | null {
  if (!header || size < SMALLEST) return null;
  const wanted = new Map(
    header.split(',').map((part) => {
      const [name = '', ...parameters] = part.split(';').map((text) => text.trim().toLowerCase());
      const q = parameters.find((text) => text.startsWith('q='));
      return [name, q ? Number(q.slice(2)) : 1];
    }),
  );
  const isWanted = (name: Encoding) => (wanted.get(name) ?? wanted.get('*') ?? 0) > 0;
  if (isWanted('br')) return 'br';
  return isWanted('gzip') ? 'gzip' : null;
}

/** Compresses off the serving loop. */
export function encode(bytes: Uint8Array, encoding: Encoding): Promise<Uint8Array<ArrayBuffer>> {
  return encoding === 'br'
    ? compressBrotli(bytes, {
        params: {
          [constants.BROTLI_PARAM_QUALITY]: BROTLI_QUALITY,
          [constants.BROTLI_PARAM_SIZE_HINT]: bytes.byteLength,
        },
      })
    : compressGzip(bytes);
}
