import { createRoute, z } from '@hono/zod-openapi';
import { lastChange } from '../../../src/lib/services/series/lastChange.ts';
import { listSeries } from '../../../src/lib/services/series/list.ts';
import type { Api } from '../../context.ts';
import { listOf, pageQuery, paginate } from '../../pagination.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { presentSeries, seriesSchema } from './schema.ts';

const text = (description: string) => z.string().max(200).optional().openapi({ description });

/** GET /series */
export function registerListSeries(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/series',
    operationId: 'listSeries',
    tags: ['Series'],
    summary: 'The catalogue of series',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: {
      query: z.strictObject({
        economy: text('Code of an economy.'),
        concept: text('A concept, such as money_surprise.'),
        q: text('Words that a series must mention.'),
        ...pageQuery,
      }),
    },
    responses: {
      200: {
        description: 'Series by id.',
        content: { 'application/json': { schema: listOf(seriesSchema) } },
      },
      ...problems(400, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db, env } = c.get('runtime');
    const { limit, cursor, ...filter } = c.req.valid('query');
    const [series, changed] = await Promise.all([
      listSeries(db, c.get('view'), filter),
      lastChange(db, c.get('view')),
    ]);
    c.set('lastModified', changed);
    const page = paginate(c, series, { limit, cursor, keyOf: ({ id }) => [id] });
    const data = page.data.map((entry) => presentSeries(entry, env.publicUrl));
    return c.json({ data, next: page.next }, 200);
  });
}
