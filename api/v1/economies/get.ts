import { createRoute, z } from '@hono/zod-openapi';
import { getEconomy } from '../../../src/lib/services/economies/public.ts';
import { lastChange } from '../../../src/lib/services/series/lastChange.ts';
import type { Api } from '../../context.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { notFound } from '../../problems.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { economySchema, presentEconomy } from './schema.ts';

/** GET /economies/{code} */
export function registerGetEconomy(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/economies/{code}',
    operationId: 'getEconomy',
    tags: ['Economies'],
    summary: 'One economy',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: {
      params: z.object({ code: z.string().openapi({ example: 'XAL' }) }),
      query: z.strictObject({}),
    },
    responses: {
      200: {
        description: 'The economy.',
        content: { 'application/json': { schema: economySchema } },
      },
      ...problems(400, 404, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db } = c.get('runtime');
    const { code } = c.req.valid('param');
    const standing = await getEconomy(db, c.get('view'), code);
    if (!standing) throw notFound(`There is no economy "${code}".`);
    c.set('lastModified', await lastChange(db, c.get('view')));
    return c.json(presentEconomy(standing), 200);
  });
}
