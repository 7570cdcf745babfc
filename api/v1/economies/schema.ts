import { z } from '@hono/zod-openapi';
import type { EconomyStanding } from '../../../src/lib/services/economies/public.ts';
import { frequencySchema, periodSchema, timeSchema } from '../../responses.ts';

export const economySchema = z
  .object({
    code: z.string().openapi({ example: 'XAL' }),
    name: z.string(),
    currency: z.string(),
    frequency: frequencySchema,
    contact: z.string().openapi({ description: 'The desk that answers questions.' }),
    specification: z
      .object({
        version: z.int(),
        assumptions: z.looseObject({}),
        reason: z.string(),
        holds_from: z.string(),
      })
      .nullable()
      .openapi({ description: 'The specification in force.' }),
    latest_release: z
      .object({
        id: z.string(),
        period: periodSchema,
        revision: z.int(),
        published_at: timeSchema,
      })
      .nullable(),
    next_release: z
      .object({ period: periodSchema, due_at: timeSchema, reason: z.string() })
      .nullable()
      .openapi({
        description: 'The next announced release; `reason` says why its date was changed.',
      }),
  })
  .openapi('Economy');

/** An economy as the API tells of it. */
export function presentEconomy(standing: EconomyStanding): z.infer<typeof economySchema> {
  const { economy, specification, latest, next } = standing;
  return {
    code: economy.code,
    name: economy.name,
    currency: economy.currency,
    frequency: economy.frequency,
    contact: economy.contact,
    specification: specification && {
      version: specification.version,
      assumptions: { ...specification.assumptions },
      reason: specification.reason,
      holds_from: specification.holdsFrom,
    },
    latest_release: latest && {
      id: latest.id,
      period: latest.period,
      revision: latest.revision,
      published_at: latest.publishedAt.toISOString(),
    },
    next_release: next && {
      period: next.period,
      due_at: next.dueAt.toISOString(),
      reason: next.reason,
    },
  };
}
