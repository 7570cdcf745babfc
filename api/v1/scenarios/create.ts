import { createRoute, z } from '@hono/zod-openapi';
import type { Fault } from '../../../src/lib/econ/types.ts';
import { RefusedError } from '../../../src/lib/econ/refusal.ts';
import { parseRequest } from '../../../src/lib/econ/validate/request.ts';
import type { Api } from '../../context.ts';
import { offers } from '../../middleware/formats.ts';
import { authenticate } from '../../middleware/key.ts';
import { limit } from '../../middleware/limits.ts';
import type { ApiParts } from '../../parts.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import { jsonBody, smallBody } from './body.ts';
import { requestDocument, resultSchema } from './schema.ts';

const MOST_PERIODS = 2_000;
const SERIES = ['money', 'prices', 'activity', 'surveyed_growth'] as const;

/** POST /scenarios */
export function registerCreateScenario(api: Api, { verify, limits }: ApiParts): void {
  const route = createRoute({
    method: 'post',
    path: '/scenarios',
    operationId: 'createScenario',
    tags: ['Scenarios'],
    summary: 'Compute with your own data and assumptions; nothing is stored',
    security: SECURITY,
    middleware: [
      authenticate(verify, 'scenarios'),
      limit(limits),
      offers('json'),
      smallBody,
    ] as const,
    request: {
      query: z.strictObject({}),
      body: { required: true, content: { 'application/json': { schema: requestDocument } } },
    },
    responses: {
      200: {
        description: 'The result; arrays run over `periods`, in log points.',
        content: { 'application/json': { schema: resultSchema } },
      },
      ...problems(400, 413, 415, 422, 503, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const body = await jsonBody(c);
    refuseLong(body);
    // Read here already, so that only a well-formed request takes a worker's time.
    const request = parseRequest(body);
    const result = await c.get('runtime').workers.compute(request);
    c.header('cache-control', 'no-store');
    return c.json(result, 200);
  });
}

function refuseLong(body: unknown): void {
  const fields = (body ?? {}) as Record<string, { values?: unknown } | null | undefined>;
  const faults = SERIES.flatMap((name): Fault[] => {
    const values = fields[name]?.values;
    return Array.isArray(values) && values.length > MOST_PERIODS
      ? [
          {
            pointer: `/${name}/values`,
            message: `A series may have at most ${MOST_PERIODS} periods here, not ${values.length}.`,
          },
        ]
      : [];
  });
  if (faults.length > 0) throw new RefusedError(faults);
}
