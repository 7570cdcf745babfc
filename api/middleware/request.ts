import type { MiddlewareHandler } from 'hono';
import { randomUUID } from 'node:crypto';
import type { Runtime } from '../../src/lib/runtime.ts';
import type { ApiEnv } from '../context.ts';

/** Names the request, reads the clock once, and gives every answer the headers all have. */
export function request(runtime: Runtime): MiddlewareHandler<ApiEnv> {
  return async (c, next) => {
    const named = c.env?.outgoing?.getHeader('x-request-id');
    const requestId = typeof named === 'string' ? named : randomUUID();
    const now = runtime.clock.now();
    c.set('runtime', runtime);
    c.set('requestId', requestId);
    c.set('now', now);
    c.set('view', { at: now });
    c.set('lastModified', null);
    await next();
    c.header('x-request-id', requestId);
    c.header('x-content-type-options', 'nosniff');
  };
}
