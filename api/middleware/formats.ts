import type { MiddlewareHandler } from 'hono';
import { parseAccept } from 'hono/utils/accept';
import type { ApiEnv } from '../context.ts';
import { badRequest, ProblemError, problemType } from '../problems.ts';

/** Formats and their media types. */
export const MEDIA_TYPES = { json: 'application/json', csv: 'text/csv' } as const;
export type Format = keyof typeof MEDIA_TYPES;

/** Chooses among the formats a route offers by `?format=` or else by `Accept`; 406 where none will do. */
export function offers(...formats: Format[]): MiddlewareHandler<ApiEnv> {
  return async (c, next) => {
    const asked = c.req.query('format');
    if (asked !== undefined && formats.length > 1) {
      const format = formats.find((name) => name === asked);
      if (!format) {
        const message = `format is one of ${formats.join(', ')}, not "${asked}".`;
        throw badRequest([{ parameter: 'format', message }]);
      }
      c.set('format', format);
      return next();
    }
    c.set('format', preferred(c.req.header('accept'), formats));
    return next();
  };
}

function preferred(header: string | undefined, formats: Format[]): Format {
  if (!header?.trim()) return formats[0]!;
  const accepted = parseAccept(header);
  const ranked = formats
    .map((format) => ({ format, q: quality(accepted, MEDIA_TYPES[format]) }))
    .filter(({ q }) => q > 0)
    .sort((a, b) => b.q - a.q);
  if (ranked[0]) return ranked[0].format;
  const types = formats.map((format) => MEDIA_TYPES[format]);
  throw new ProblemError({
    status: 406,
    type: problemType('not-acceptable'),
    title: 'No format here is one you accept',
    detail: `This address answers ${types.join(' or ')}.`,
  });
}

/** How much a media type is wanted: the most specific range that names it decides (RFC 9110, 12.5.1). */
function quality(accepted: ReturnType<typeof parseAccept>, type: string): number {
  const ranges = [type, `${type.split('/')[0]}/*`, '*/*'];
  for (const range of ranges) {
    const found = accepted.find((accept) => accept.type.toLowerCase() === range);
    if (found) return found.q;
  }
  return 0;
}
