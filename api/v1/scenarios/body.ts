import { bodyLimit } from 'hono/body-limit';
import type { MiddlewareHandler } from 'hono';
import type { ApiContext, ApiEnv } from '../../context.ts';
import { badRequest, ProblemError, problemType } from '../../problems.ts';

const LARGEST = 1024 * 1024;
const IS_JSON = /^application\/(?:[\w.+-]+\+)?json\s*(?:;\s*charset="?utf-8"?\s*)?$/i;

/** Refuses a body above 1 MiB while it arrives. */
export const smallBody: MiddlewareHandler<ApiEnv> = bodyLimit({
  maxSize: LARGEST,
  onError: () => {
    throw new ProblemError({
      status: 413,
      type: problemType('too-large'),
      title: 'The body is too large',
      detail: 'A request may have at most 1 MiB.',
    });
  },
});

/** The body as JSON of any shape. @throws ProblemError 415 where it is sent as something else, 400 where it is no JSON. */
export async function jsonBody(c: ApiContext): Promise<unknown> {
  const isPlain = ['', 'identity'].includes(c.req.header('content-encoding') ?? '');
  if (!IS_JSON.test(c.req.header('content-type') ?? '') || !isPlain) {
    throw new ProblemError({
      status: 415,
      type: problemType('unsupported-media-type'),
      title: 'The body is not sent as JSON',
      detail: 'Send application/json in UTF-8, without a content encoding.',
      headers: { accept: 'application/json' },
    });
  }
  const bytes = await c.req.arrayBuffer();
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes)) as unknown;
  } catch {
    throw badRequest([{ pointer: '', message: 'The body is not well-formed JSON in UTF-8.' }]);
  }
}
