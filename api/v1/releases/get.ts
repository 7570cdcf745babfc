import { createRoute, z } from '@hono/zod-openapi';
import { getRelease, listRevisions } from '../../../src/lib/services/releases/public.ts';
import { lastChange } from '../../../src/lib/services/series/lastChange.ts';
import type { Api } from '../../context.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { notFound } from '../../problems.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { presentRelease, releaseSchema } from './schema.ts';

const ID = /^([A-Z]{3})-(\d{4}(?:-(?:\d{2}|Q[1-4]))?)-r([1-9]\d{0,3})$/;

/** GET /releases/{id} */
export function registerGetRelease(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/releases/{id}',
    operationId: 'getRelease',
    tags: ['Releases'],
    summary: 'One revision of a release',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: {
      params: z.object({ id: z.string().openapi({ example: 'XAL-2031-08-r1' }) }),
      query: z.strictObject({}),
    },
    responses: {
      200: {
        description: 'The release with what was frozen with it.',
        content: { 'application/json': { schema: releaseSchema } },
      },
      ...problems(400, 404, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db, env } = c.get('runtime');
    const view = c.get('view');
    const { id } = c.req.valid('param');
    const [, economy, period, revision] = ID.exec(id) ?? [];
    const which = economy && period ? { economy, period, revision: Number(revision) } : null;
    const release = which && (await getRelease(db, view, which));
    if (!which || !release) throw notFound(`There is no release "${id}".`);
    const revisions = await listRevisions(db, view, which);
    c.set('lastModified', await lastChange(db, view));
    const isNewest = revisions.at(-1)?.id === release.id;
    return c.json(presentRelease(release, { publicUrl: env.publicUrl, isNewest }), 200);
  });
}
