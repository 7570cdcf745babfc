import { OpenAPIHono } from '@hono/zod-openapi';
import { cors } from 'hono/cors';
import type { Runtime } from '../src/lib/runtime.ts';
import { createLimits } from '../src/lib/services/keys/limits.ts';
import { keyVerifier } from '../src/lib/services/keys/verify.ts';
import type { Api, ApiEnv } from './context.ts';
import { registerDocument } from './document.ts';
import { onError } from './errors.ts';
import { refuseFaulty } from './faults.ts';
import { refuseOtherMethods } from './methods.ts';
import { request } from './middleware/request.ts';
import type { ApiParts } from './parts.ts';
import { notFound } from './problems.ts';
import { registerListCalendar } from './v1/calendar/list.ts';
import { registerGetEconomy } from './v1/economies/get.ts';
import { registerListEconomies } from './v1/economies/list.ts';
import { registerGetMe } from './v1/me/get.ts';
import { registerGetRelease } from './v1/releases/get.ts';
import { registerListReleases } from './v1/releases/list.ts';
import { registerCreateScenario } from './v1/scenarios/create.ts';
import { registerGetSeries } from './v1/series/get.ts';
import { registerListSeries } from './v1/series/list.ts';
import { registerGetObservations } from './v1/series/observations.ts';

const REGISTERED = [
  registerListEconomies,
  registerGetEconomy,
  registerListSeries,
  registerGetSeries,
  registerGetObservations,
  registerListReleases,
  registerGetRelease,
  registerListCalendar,
  registerCreateScenario,
  registerGetMe,
];

/** Headers that a page of another origin may send and read. */
const SENT = ['Authorization', 'X-API-Key', 'If-None-Match', 'If-Modified-Since'];
const READ = ['ETag', 'Last-Modified', 'Link', 'RateLimit', 'RateLimit-Policy', 'Retry-After'];

/**
 * The public API of one process, at /api/v1. It compresses its answers itself, needs no closing, and shows what is
 * public at the instant of each request by the runtime's clock.
 */
export function createApi(runtime: Runtime): Api {
  const everywhere: Api = new OpenAPIHono<ApiEnv>({ defaultHook: refuseFaulty });
  everywhere.onError(onError);
  everywhere.notFound((c) => onError(notFound('The API has no such address.'), c));
  everywhere.use('*', request(runtime));
  everywhere.use(
    '*',
    cors({
      origin: '*',
      allowMethods: ['GET', 'HEAD', 'OPTIONS'],
      allowHeaders: SENT,
      exposeHeaders: [...READ, 'X-Request-Id'],
      maxAge: 86_400,
    }),
  );
  const api: Api = everywhere.basePath('/api/v1');
  const parts: ApiParts = {
    verify: keyVerifier(runtime.db),
    limits: createLimits(runtime.db, (error) =>
      runtime.log.error({ err: error }, 'usage of keys is not settled'),
    ),
  };
  for (const register of REGISTERED) register(api, parts);
  registerDocument(api, runtime.env.publicUrl);
  refuseOtherMethods(api);
  return everywhere;
}
