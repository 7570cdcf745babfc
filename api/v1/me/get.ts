import { createRoute, z } from '@hono/zod-openapi';
import type { Api } from '../../context.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { meSchema } from './schema.ts';

/** GET /me */
export function registerGetMe(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/me',
    operationId: 'getMe',
    tags: ['Keys'],
    summary: 'What this key may do, and what it has used',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json'),
    request: { query: z.strictObject({}) },
    responses: {
      200: {
        description: 'The key that was sent.',
        content: { 'application/json': { schema: meSchema } },
      },
      ...problems(400, ...KEYED),
    },
  });
  api.openapi(route, (c) => {
    const { scopes, plan, expiresAt } = c.get('key');
    const limits = c.get('charge').allowances.map(({ span, limit, remaining, reset }) => ({
      span,
      limit,
      used: limit - remaining,
      resets_at: new Date(c.get('now').getTime() + reset * 1_000).toISOString(),
    }));
    const expires = expiresAt?.toISOString() ?? null;
    return c.json({ scopes, plan: plan.name, limits, expires_at: expires }, 200);
  });
}
