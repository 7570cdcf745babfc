import { z } from '@hono/zod-openapi';
import { SCOPES } from '../../../src/lib/services/keys/scopes.ts';
import { SPANS } from '../../../src/lib/services/keys/spans.ts';
import { timeSchema } from '../../responses.ts';

export const meSchema = z
  .object({
    scopes: z.array(z.enum(SCOPES)),
    plan: z.string().openapi({ example: 'open' }),
    limits: z.array(
      z.object({
        span: z.enum(SPANS),
        limit: z.int(),
        used: z.int(),
        resets_at: timeSchema,
      }),
    ),
    expires_at: timeSchema.nullable(),
  })
  .openapi('Me');
