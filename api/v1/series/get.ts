import { createRoute, z } from '@hono/zod-openapi';
import { getSeries } from '../../../src/lib/services/series/get.ts';
import { lastChange } from '../../../src/lib/services/series/lastChange.ts';
import type { Api } from '../../context.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { notFound } from '../../problems.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { presentSeries, seriesIdParam, seriesSchema } from './schema.ts';

/** GET /series/{id} */
export function registerGetSeries(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/series/{id}',
    operationId: 'getSeries',
    tags: ['Series'],
    summary: 'What a series is',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: { params: seriesIdParam, query: z.strictObject({}) },
    responses: {
      200: {
        description: 'The series, without its values.',
        content: { 'application/json': { schema: seriesSchema } },
      },
      ...problems(400, 404, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db, env } = c.get('runtime');
    const { id } = c.req.valid('param');
    const series = await getSeries(db, c.get('view'), id);
    if (!series) throw notFound(`There is no series "${id}".`);
    c.set('lastModified', await lastChange(db, c.get('view')));
    return c.json(presentSeries(series, env.publicUrl), 200);
  });
}
