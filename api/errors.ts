import { HTTPException } from 'hono/http-exception';
import { BusyError } from '../src/lib/publication/workers.ts';
import { ServiceError } from '../src/lib/services/context.ts';
import { RefusedError, problem } from '../src/lib/econ/refusal.ts';
import type { ApiContext } from './context.ts';
import { ProblemError, problemResponse, problemType, type ProblemParts } from './problems.ts';

/** Node's and PostgreSQL's codes for a database that cannot be reached or is shutting down. */
const AWAY = /^(ECONNREFUSED|ECONNRESET|ETIMEDOUT|ENOTFOUND|EPIPE|57P0[1-3]|08\d{3}|53300)$/;
const AWAY_IN_WORDS = /timeout exceeded when trying to connect|Connection terminated/;

/** Answers whatever was thrown: what we know as its problem document, anything else as a 500 that says nothing of it. */
export function onError(error: Error, c: ApiContext): Response {
  const known = partsOf(error);
  if (known) return problemResponse(c, known);
  c.get('runtime').log.error({ err: error, request: c.get('requestId') }, 'an API call failed');
  return problemResponse(c, {
    status: 500,
    type: problemType('failure'),
    title: 'The call failed',
    detail: 'Something went wrong here, not in your request. It has been noted; try again later.',
  });
}

function partsOf(error: Error): ProblemParts | null {
  if (error instanceof ProblemError) return error.parts;
  if (error instanceof RefusedError) return { ...problem(error) };
  if (error instanceof ServiceError && error.kind === 'not_found') {
    return {
      status: 404,
      type: problemType('not-found'),
      title: 'There is nothing here',
      detail: error.message,
    };
  }
  if (error instanceof BusyError) {
    return {
      status: 503,
      type: problemType('unavailable'),
      title: 'Too much is being computed',
      detail: error.message,
      headers: { 'retry-after': '5' },
    };
  }
  if (error instanceof HTTPException && error.status < 500) {
    return {
      status: error.status as ProblemParts['status'],
      type: problemType('bad-request'),
      title: 'The request cannot be understood',
      detail: 'The request cannot be read.',
    };
  }
  return isDatabaseAway(error)
    ? {
        status: 503,
        type: problemType('unavailable'),
        title: 'The figures cannot be reached',
        detail: 'The database does not answer for the moment. Try again shortly.',
        headers: { 'retry-after': '5' },
      }
    : null;
}

function isDatabaseAway(error: Error & { code?: unknown }): boolean {
  return AWAY.test(String(error.code ?? '')) || AWAY_IN_WORDS.test(error.message);
}
