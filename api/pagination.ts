import { z } from '@hono/zod-openapi';
import type { ApiContext } from './context.ts';
import { badRequest } from './problems.ts';

const DEFAULT_LIMIT = 100;
const MAX_LIMIT = 1_000;

/** Query parameters of every list. */
export const pageQuery = {
  limit: z
    .string()
    .regex(/^[1-9]\d{0,3}$/, `limit is a whole number from 1 to ${MAX_LIMIT}.`)
    .transform(Number)
    .refine((limit) => limit <= MAX_LIMIT, `limit is a whole number from 1 to ${MAX_LIMIT}.`)
    .optional()
    .openapi({
      type: 'integer',
      minimum: 1,
      maximum: MAX_LIMIT,
      default: DEFAULT_LIMIT,
      description: 'How many entries at most.',
    }),
  cursor: z.string().max(500).optional().openapi({
    description: "Where to go on: a list's `next`. Keep the other parameters as they were.",
  }),
};

/** The shape of every list's answer. */
export function listOf<T extends z.ZodType>(entry: T) {
  return z.object({
    data: z.array(entry),
    next: z
      .string()
      .nullable()
      .openapi({ description: 'Cursor of the next page; null at the end.' }),
  });
}

/** Texts that order a list and name one entry in it, most significant first; times in RFC 3339 UTC. */
type Key = string[];

/**
 * One page of an ordered list by keyset: entries after the cursor's own key, so that entries that come or go in
 * between shift nothing. Sets `Link: rel="next"`.
 */
export function paginate<T>(
  c: ApiContext,
  entries: T[],
  options: { limit?: number; cursor?: string; keyOf: (entry: T) => Key; newestFirst?: boolean },
): { data: T[]; next: string | null } {
  const { limit = DEFAULT_LIMIT, cursor, keyOf, newestFirst = false } = options;
  const direction = newestFirst ? -1 : 1;
  const sorted = entries
    .map((entry) => ({ entry, key: keyOf(entry) }))
    .sort((a, b) => direction * compare(a.key, b.key));
  const after = cursor === undefined ? null : read(cursor);
  const rest = after ? sorted.filter(({ key }) => direction * compare(key, after) > 0) : sorted;
  const page = rest.slice(0, limit);
  const last = page.at(-1);
  const next = last && rest.length > page.length ? write(last.key) : null;
  if (next) {
    const url = new URL(c.req.url);
    url.searchParams.set('cursor', next);
    c.header('link', `<${url.pathname}${url.search}>; rel="next"`);
  }
  return { data: page.map(({ entry }) => entry), next };
}

function compare(a: Key, b: Key): number {
  for (let i = 0; i < a.length; i += 1) {
    if (a[i]! < (b[i] ?? '')) return -1;
    if (a[i]! > (b[i] ?? '')) return 1;
  }
  return 0;
}

function write(key: Key): string {
  return Buffer.from(JSON.stringify(key)).toString('base64url');
}

function read(cursor: string): Key {
  try {
    const key: unknown = JSON.parse(Buffer.from(cursor, 'base64url').toString());
    if (Array.isArray(key) && key.every((part) => typeof part === 'string')) return key;
  } catch {
    // Falls through to the same answer as any other text that is no cursor.
  }
  const message = 'cursor is not one that a list has answered; leave it out to begin again.';
  throw badRequest([{ parameter: 'cursor', message }]);
}
