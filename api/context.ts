import type { OpenAPIHono } from '@hono/zod-openapi';
import type { Context } from 'hono';
import type { Runtime } from '../src/lib/runtime.ts';
import type { Charge } from '../src/lib/services/keys/limits.ts';
import type { VerifiedKey } from '../src/lib/services/keys/verify.ts';
import type { View } from '../src/lib/services/view.ts';
import type { Format } from './middleware/formats.ts';

/** What the middleware leaves for the handlers of one request. */
export interface ApiEnv {
  Bindings: {
    /** Node's response, where the product's own server stands in front; it has named the request already. */
    outgoing?: { getHeader(name: string): unknown };
  };
  Variables: {
    runtime: Runtime;
    requestId: string;
    /** Database time, read once a request. */
    now: Date;
    /** What is public now. */
    view: View;
    key: VerifiedKey;
    charge: Charge;
    format: Format;
    /** When what is answered last changed; null where that cannot be said. */
    lastModified: Date | null;
  };
}

export type Api = OpenAPIHono<ApiEnv>;
export type ApiContext = Context<ApiEnv>;
