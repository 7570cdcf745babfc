import type { MiddlewareHandler } from 'hono';
import type { Allowance, Limits } from '../../src/lib/services/keys/limits.ts';
import type { ApiEnv } from '../context.ts';
import { ProblemError } from '../problems.ts';

/** Counts the call against the key's plan; an answer of 304 is given back. */
export function limit(limits: Limits): MiddlewareHandler<ApiEnv> {
  return async (c, next) => {
    const charge = await limits.charge(c.get('key'), c.get('now'));
    c.set('charge', charge);
    if (charge.exceeded.length > 0) {
      throw new ProblemError({
        status: 429,
        type: 'https://iana.org/assignments/http-problem-types#quota-exceeded',
        title: 'The limit of the plan is reached',
        detail: charge.exceeded
          .map((allowance) => `At most ${allowance.limit} calls a ${allowance.span}.`)
          .join(' '),
        extra: { 'violated-policies': charge.exceeded.map(({ span }) => span) },
        headers: {
          'retry-after': String(Math.max(...charge.exceeded.map(({ reset }) => reset))),
          ...limitHeaders(charge.allowances),
        },
      });
    }
    await next();
    if (c.res.status === 304) await charge.refund();
    for (const [name, value] of Object.entries(limitHeaders(charge.allowances))) {
      c.header(name, value);
    }
  };
}

/** The fields of draft-ietf-httpapi-ratelimit-headers. */
function limitHeaders(allowances: Allowance[]): Record<string, string> {
  return {
    'ratelimit-policy': allowances
      .map(({ span, limit: quota, window }) => `"${span}";q=${quota};w=${window}`)
      .join(', '),
    ratelimit: allowances
      .map(({ span, remaining, reset }) => `"${span}";r=${remaining};t=${reset}`)
      .join(', '),
  };
}
