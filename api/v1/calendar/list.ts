import { createRoute, z } from '@hono/zod-openapi';
import { upcoming } from '../../../src/lib/services/calendar/upcoming.ts';
import { lastChange } from '../../../src/lib/services/series/lastChange.ts';
import type { Api } from '../../context.ts';
import { listOf, pageQuery, paginate } from '../../pagination.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { announcementSchema, presentAnnouncement } from './schema.ts';

const time = (name: string, description: string) =>
  z.iso
    .datetime({ offset: true, error: `${name} is a time such as 2031-09-24T07:00:00Z.` })
    .optional()
    .openapi({ description });

/** GET /calendar */
export function registerListCalendar(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/calendar',
    operationId: 'listCalendar',
    tags: ['Calendar'],
    summary: 'Announced releases',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: {
      query: z.strictObject({
        from: time('from', 'Due at this time or later.'),
        to: time('to', 'Due at this time or earlier.'),
        ...pageQuery,
      }),
    },
    responses: {
      200: {
        description: 'What is announced and not out yet, soonest first.',
        content: { 'application/json': { schema: listOf(announcementSchema) } },
      },
      ...problems(400, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db } = c.get('runtime');
    const { from, to, limit, cursor } = c.req.valid('query');
    const [all, changed] = await Promise.all([
      upcoming(db, c.get('view')),
      lastChange(db, c.get('view')),
    ]);
    c.set('lastModified', changed);
    const wanted = all.filter(
      ({ dueAt }) => (!from || dueAt >= new Date(from)) && (!to || dueAt <= new Date(to)),
    );
    const page = paginate(c, wanted, {
      limit,
      cursor,
      keyOf: ({ dueAt, economyCode, period }) => [dueAt.toISOString(), economyCode, period],
    });
    return c.json({ data: page.data.map(presentAnnouncement), next: page.next }, 200);
  });
}
