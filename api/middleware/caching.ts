import type { MiddlewareHandler } from 'hono';
import { createHash } from 'node:crypto';
import type { ApiContext, ApiEnv } from '../context.ts';
import { encode, encodingFor } from './encoding.ts';

const VARY = 'Accept, Accept-Encoding, Authorization, X-API-Key, Origin';

/** Gives an answer its strong ETag, answers 304 to whoever has it already, and compresses what is left to send. */
export const caching: MiddlewareHandler<ApiEnv> = async (c, next) => {
  await next();
  c.header('vary', VARY);
  if (c.res.status !== 200) return;
  const bytes = new Uint8Array(await c.res.arrayBuffer());
  const encoding = encodingFor(c.req.header('accept-encoding'), bytes.byteLength);
  const hash = createHash('sha256').update(bytes).digest('base64url').slice(0, 27);
  const headers = new Headers(c.res.headers);
  headers.set('etag', encoding ? `"${hash}-${encoding}"` : `"${hash}"`);
  headers.set('cache-control', 'private, no-cache');
  const lastModified = c.get('lastModified');
  if (lastModified) headers.set('last-modified', lastModified.toUTCString());
  if (isKnown(c, hash, lastModified)) {
    headers.delete('content-type');
    replace(c, new Response(null, { status: 304, headers }));
    return;
  }
  const body = encoding ? await encode(bytes, encoding) : bytes;
  if (encoding) headers.set('content-encoding', encoding);
  headers.set('content-length', String(body.byteLength));
  replace(c, new Response(body, { status: 200, headers }));
};

/** Setting `c.res` twice would merge the old answer's headers into the new one's. */
function replace(c: ApiContext, response: Response): void {
  c.res = undefined;
  c.res = response;
}

/** Whether the caller's own copy is this very answer, in whichever encoding it was sent (RFC 9110, 13.1). */
function isKnown(c: ApiContext, hash: string, lastModified: Date | null): boolean {
  const tags = c.req.header('if-none-match');
  if (tags !== undefined) {
    return tags.split(',').some((tag) => {
      const [, name] = /^(?:W\/)?"([^"]*)"$/.exec(tag.trim()) ?? [];
      return tag.trim() === '*' || name?.replace(/-(br|gzip)$/, '') === hash;
    });
  }
  const since = Date.parse(c.req.header('if-modified-since') ?? '');
  if (!lastModified || Number.isNaN(since)) return false;
  return Math.floor(lastModified.getTime() / 1_000) * 1_000 <= since;
}
