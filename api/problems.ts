import type { ContentfulStatusCode } from 'hono/utils/http-status';
import type { ApiContext } from './context.ts';

/** One fault of a request: where it is (a parameter's name, or an RFC 6901 pointer into the body) and what is wrong. */
export interface Fault {
  parameter?: string;
  pointer?: string;
  period?: string;
  message: string;
}

export interface ProblemParts {
  status: ContentfulStatusCode;
  type: string;
  title: string;
  detail: string;
  errors?: Fault[];
  /** Members of the problem's own type. */
  extra?: Record<string, unknown>;
  headers?: Record<string, string>;
}

/** Thrown anywhere below the API, answered as an RFC 9457 problem document. */
export class ProblemError extends Error {
  constructor(readonly parts: ProblemParts) {
    super(parts.detail);
    this.name = 'ProblemError';
  }
}

/** The name of one of our kinds of problem. */
export function problemType(name: string): string {
  return `urn:slackwater:problem:${name}`;
}

/** The problem document as an answer. Nothing of an exception's own text gets here but a ProblemError's. */
export function problemResponse(c: ApiContext, parts: ProblemParts): Response {
  const { status, type, title, detail, errors, extra, headers } = parts;
  const instance = `urn:uuid:${c.get('requestId')}`;
  const document = { type, title, status, detail, instance, ...(errors && { errors }), ...extra };
  return c.body(`${JSON.stringify(document)}\n`, status, {
    'content-type': 'application/problem+json',
    'cache-control': 'no-store',
    ...headers,
  });
}

/** There is nothing at this address, or nothing yet: the two answers are the same. */
export function notFound(detail: string): ProblemError {
  return new ProblemError({
    status: 404,
    type: problemType('not-found'),
    title: 'There is nothing here',
    detail,
  });
}

/** The address or a parameter is wrong. */
export function badRequest(errors: Fault[]): ProblemError {
  return new ProblemError({
    status: 400,
    type: problemType('bad-request'),
    title: 'The request cannot be understood',
    detail:
      errors.length === 1
        ? errors[0]!.message
        : `${errors.length} things in the request need changing; each is listed under errors.`,
    errors,
  });
}
