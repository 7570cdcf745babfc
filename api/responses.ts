import { z } from '@hono/zod-openapi';

const faultSchema = z
  .object({
    parameter: z.string().optional().openapi({ description: 'The parameter at fault.' }),
    pointer: z
      .string()
      .optional()
      .openapi({ description: 'Where in the body the fault is (RFC 6901).' }),
    period: z.string().optional(),
    message: z.string(),
  })
  .openapi('Fault');

/** RFC 9457. */
export const problemSchema = z
  .looseObject({
    type: z.string(),
    title: z.string(),
    status: z.int(),
    detail: z.string(),
    instance: z.string(),
    errors: z.array(faultSchema).optional(),
  })
  .openapi('Problem');

const MEANING = {
  400: 'The address or a parameter is wrong, or the body is no JSON.',
  401: 'No key, or one that is unknown, revoked or expired.',
  403: 'The key lacks the scope.',
  404: 'There is nothing at this address, or nothing yet.',
  406: 'The address has no format that the caller accepts.',
  413: 'The body is too large.',
  415: 'The body is not sent as JSON.',
  422: 'The request is well formed and refused; every fault is listed.',
  429: 'The limit of the plan is reached.',
  500: 'Something failed here.',
  503: 'The figures cannot be reached for the moment.',
} as const;

type ProblemStatus = keyof typeof MEANING;
type ProblemAnswer = {
  description: string;
  content: { 'application/problem+json': { schema: typeof problemSchema } };
};

/** The problem documents of a route, for its description. */
export function problems<S extends ProblemStatus>(...statuses: S[]): Record<S, ProblemAnswer> {
  return Object.fromEntries(
    statuses.map((status) => [
      status,
      {
        description: MEANING[status],
        content: { 'application/problem+json': { schema: problemSchema } },
      },
    ]),
  ) as unknown as Record<S, ProblemAnswer>;
}

/** What every address with a key may answer besides its own. */
export const KEYED = [401, 403, 406, 429, 500, 503] as const;

/** Both ways of sending a key. */
export const SECURITY: Record<string, string[]>[] = [{ bearer: [] }, { header: [] }];

/** A time in RFC 3339, UTC. */
export const timeSchema = z.iso
  .datetime()
  .openapi({ format: 'date-time', example: '2031-09-24T07:00:00.000Z' });

/** A period in the form of its series' frequency. */
export const periodSchema = z
  .string()
  .regex(/^\d{4}(-(0[1-9]|1[0-2])|-Q[1-4])?$/)
  .openapi({
    example: '2031-08',
    description: 'A month 2031-08, a quarter 2031-Q3 or a year 2031.',
  });

export const frequencySchema = z.enum(['monthly', 'quarterly', 'annual']);
