import { z } from '@hono/zod-openapi';
import type { Announced } from '../../../src/lib/services/calendar/upcoming.ts';
import { periodSchema, timeSchema } from '../../responses.ts';

export const announcementSchema = z
  .object({
    economy: z.string(),
    period: periodSchema,
    due_at: timeSchema,
    announced_at: timeSchema,
    reason: z
      .string()
      .openapi({ description: 'Why the date was changed; empty at the first announcement.' }),
  })
  .openapi('Announcement');

/** An announced release as the API tells of it. */
export function presentAnnouncement(announced: Announced): z.infer<typeof announcementSchema> {
  return {
    economy: announced.economyCode,
    period: announced.period,
    due_at: announced.dueAt.toISOString(),
    announced_at: announced.announcedAt.toISOString(),
    reason: announced.reason,
  };
}
