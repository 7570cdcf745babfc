import type { MiddlewareHandler } from 'hono';
import type { Scope } from '../../src/lib/services/keys/scopes.ts';
import type { KeyVerifier } from '../../src/lib/services/keys/verify.ts';
import type { ApiContext, ApiEnv } from '../context.ts';
import { ProblemError, problemType } from '../problems.ts';

/** Lets a request through only with a key that works and has the scope. */
export function authenticate(verify: KeyVerifier, scope: Scope): MiddlewareHandler<ApiEnv> {
  return async (c, next) => {
    const plain = keyIn(c);
    const key = plain ? await verify(plain, c.get('now')) : null;
    if (!key) {
      throw new ProblemError({
        status: 401,
        type: problemType('unauthenticated'),
        title: 'A key is needed',
        detail: plain
          ? 'This key is unknown, revoked or expired.'
          : 'Send a key as "Authorization: Bearer <key>". Keys are made at /account/keys/.',
        headers: {
          'www-authenticate': `Bearer realm="Slackwater"${plain ? ', error="invalid_token"' : ''}`,
        },
      });
    }
    if (!key.scopes.includes(scope)) {
      throw new ProblemError({
        status: 403,
        type: problemType('forbidden'),
        title: 'This key may not do that',
        detail: `The key lacks the scope "${scope}".`,
        headers: {
          'www-authenticate': `Bearer realm="Slackwater", error="insufficient_scope", scope="${scope}"`,
        },
      });
    }
    c.set('key', key);
    await next();
  };
}

function keyIn(c: ApiContext): string | null {
  const [, bearer] = /^Bearer +(\S+) *$/i.exec(c.req.header('authorization') ?? '') ?? [];
  return bearer ?? c.req.header('x-api-key')?.trim() ?? null;
}
