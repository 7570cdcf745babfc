import { createRoute, z } from '@hono/zod-openapi';
import { listEconomies } from '../../../src/lib/services/economies/public.ts';
import { lastChange } from '../../../src/lib/services/series/lastChange.ts';
import type { Api } from '../../context.ts';
import { listOf, pageQuery, paginate } from '../../pagination.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { economySchema, presentEconomy } from './schema.ts';

/** GET /economies */
export function registerListEconomies(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/economies',
    operationId: 'listEconomies',
    tags: ['Economies'],
    summary: 'Economies, with their latest and next release',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: { query: z.strictObject(pageQuery) },
    responses: {
      200: {
        description: 'Economies by code.',
        content: { 'application/json': { schema: listOf(economySchema) } },
      },
      ...problems(400, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db } = c.get('runtime');
    const [standings, changed] = await Promise.all([
      listEconomies(db, c.get('view')),
      lastChange(db, c.get('view')),
    ]);
    c.set('lastModified', changed);
    const page = paginate(c, standings, {
      ...c.req.valid('query'),
      keyOf: ({ economy }) => [economy.code],
    });
    return c.json({ data: page.data.map(presentEconomy), next: page.next }, 200);
  });
}
