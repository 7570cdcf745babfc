import type { MiddlewareHandler } from 'hono';
import type { Limits } from '../src/lib/services/keys/limits.ts';
import type { Scope } from '../src/lib/services/keys/scopes.ts';
import type { KeyVerifier } from '../src/lib/services/keys/verify.ts';
import type { ApiEnv } from './context.ts';
import { caching } from './middleware/caching.ts';
import { type Format, offers } from './middleware/formats.ts';
import { authenticate } from './middleware/key.ts';
import { limit } from './middleware/limits.ts';

/** What a process's API keeps between requests. */
export interface ApiParts {
  verify: KeyVerifier;
  limits: Limits;
}

/** What stands before the handler of every address that needs a key, in this order. */
export function keyed(
  { verify, limits }: ApiParts,
  scope: Scope,
  ...formats: [Format, ...Format[]]
): MiddlewareHandler<ApiEnv>[] {
  return [authenticate(verify, scope), limit(limits), caching, offers(...formats)];
}
