import { createRoute, z } from '@hono/zod-openapi';
import { listReleases } from '../../../src/lib/services/releases/public.ts';
import { lastChange } from '../../../src/lib/services/series/lastChange.ts';
import type { Api } from '../../context.ts';
import { listOf, pageQuery, paginate } from '../../pagination.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { presentSummary, releaseSummarySchema } from './schema.ts';

/** GET /releases */
export function registerListReleases(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/releases',
    operationId: 'listReleases',
    tags: ['Releases'],
    summary: 'The standing releases',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: {
      query: z.strictObject({
        economy: z.string().max(200).optional().openapi({ description: 'Code of an economy.' }),
        since: z.iso
          .datetime({ offset: true, error: 'since is a time such as 2031-09-24T07:00:00Z.' })
          .optional()
          .openapi({ description: 'Only what was published at this time or later.' }),
        ...pageQuery,
      }),
    },
    responses: {
      200: {
        description: 'Of each economy and period the newest revision, newest first.',
        content: { 'application/json': { schema: listOf(releaseSummarySchema) } },
      },
      ...problems(400, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db, env } = c.get('runtime');
    const { economy, since, limit, cursor } = c.req.valid('query');
    const [all, changed] = await Promise.all([
      listReleases(db, c.get('view')),
      lastChange(db, c.get('view')),
    ]);
    c.set('lastModified', changed);
    const wanted = all.filter(
      (release) =>
        (economy === undefined || release.economyCode === economy) &&
        (since === undefined || release.publishedAt >= new Date(since)),
    );
    const page = paginate(c, wanted, {
      limit,
      cursor,
      keyOf: ({ publishedAt, id }) => [publishedAt.toISOString(), id],
      newestFirst: true,
    });
    const options = { publicUrl: env.publicUrl, isNewest: true };
    return c.json(
      { data: page.data.map((release) => presentSummary(release, options)), next: page.next },
      200,
    );
  });
}
