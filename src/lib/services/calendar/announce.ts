import { z } from 'zod';
import { PERIOD_FORM, frequencyOf } from '../../econ/periods.ts';
import { bringUpToDate } from '../../publication/moments.ts';
import { record } from '../audit.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { lockedEconomy } from '../economies/locked.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';

const fields = z.object({
  economy: z.string(),
  period: z.string(),
  dueAt: z.date('Enter a date and time in UTC.'),
  reason: z.string().trim().max(1000, 'Use at most 1,000 characters.').default(''),
});

export interface Announcement {
  economy: string;
  /** Reference period, in the economy's frequency. */
  period: string;
  /** The second the release is due, still to come. */
  dueAt: Date;
  /** Why an announced time changes; readers see it. */
  reason?: string;
}

/**
 * Announces when a first release is due, or changes an announced time, with a reason; drawn at once into the pages
 * that show it. Not for a release that is scheduled: its time changes by scheduling it anew.
 */
export async function announce(ctx: ServiceContext, input: Announcement): Promise<void> {
  const actor = requirePermission(ctx.actor, 'dates.approve');
  const { economy: code, period, dueAt, reason } = parseInput(fields, input);
  await transact(ctx, async (trx) => {
    const economy = await lockedEconomy(trx, code);
    if (frequencyOf(period) !== economy.frequency) {
      throw fault('period', `Enter ${PERIOD_FORM[economy.frequency]}.`);
    }
    if (dueAt <= trx.now()) throw fault('dueAt', 'Enter a time still to come.');
    const scheduled = await trx.db
      .selectFrom('release')
      .select('id')
      .where('economy_code', '=', code)
      .where('period', '=', period)
      .where('state', '=', 'scheduled')
      .executeTakeFirst();
    if (scheduled) {
      throw new ServiceError(
        'conflict',
        `${scheduled.id} is scheduled or out: its time is not announced apart from it.`,
      );
    }
    const isNew = await announceIn(trx, { economy: code, period, dueAt, reason, by: actor.id });
    if (!isNew) return;
    await record(trx, {
      action: 'calendar.announced',
      subject: `economy ${code}`,
      detail: { period, dueAt, ...(reason && { reason }) },
    });
  });
  await bringUpToDate(ctx);
}

/** The announcement itself, for a verb that announces along the way. Answers whether anything was new. */
export async function announceIn(
  ctx: InTransaction,
  { economy, period, dueAt, reason, by }: Required<Announcement> & { by: string },
): Promise<boolean> {
  const last = await ctx.db
    .selectFrom('announcement')
    .select('due_at')
    .where('economy_code', '=', economy)
    .where('period', '=', period)
    .orderBy('announced_at', 'desc')
    .limit(1)
    .executeTakeFirst();
  if (last?.due_at.getTime() === dueAt.getTime()) return false;
  if (last && !reason) {
    const was = last.due_at.toISOString().slice(0, 19).replace('T', ' ');
    throw fault('reason', `Say why the announced time, ${was} UTC, changes: readers see it.`);
  }
  await ctx.db
    .insertInto('announcement')
    .values({
      economy_code: economy,
      period,
      announced_at: ctx.now(),
      due_at: dueAt,
      reason: last ? reason : '',
      announced_by: by,
    })
    .execute();
  return true;
}

function fault(field: string, message: string): ServiceError {
  return new ServiceError('invalid', 'Some fields need another look.', [{ field, message }]);
}
