import { z } from 'zod';
import type { Release } from '../../../../db/tables.ts';
import { bringUpToDate } from '../../publication/moments.ts';
import { record } from '../audit.ts';
import { announceIn } from '../calendar/announce.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { requireSecondPair } from './contributors.ts';
import { lockedRelease, requireStep } from './locked.ts';

/** Pages are drawn before their second: nearer than this nobody can. */
export const LEAST_AHEAD_MS = 5_000;
const MOST_AHEAD_MS = 2 * 366 * 24 * 3600 * 1000;

const fields = z.object({
  id: z.string(),
  at: z.date('Enter a date and time in UTC.'),
  reason: z.string().trim().max(1000, 'Use at most 1,000 characters.').default(''),
});

/**
 * Schedules an approved release for a second, announces the time where it is new or changed (a change with its
 * reason), and draws what will change then. The same time again changes nothing.
 */
export async function scheduleRelease(
  ctx: ServiceContext,
  input: { id: string; at: Date; reason?: string },
): Promise<void> {
  const actor = requirePermission(ctx.actor, 'releases.schedule');
  const { id, at, reason } = parseInput(fields, input);
  if (at.getMilliseconds() !== 0) throw fault('at', 'Enter a time to the second.');
  const isNew = await transact(ctx, async (trx) => {
    const release = await lockedRelease(trx, id);
    const isSame = release.scheduled_for?.getTime() === at.getTime();
    if (release.state === 'scheduled' && isSame) return false;
    requireStep(trx, release, 'schedule');
    await requireSecondPair(trx, id, actor);
    const ahead = at.getTime() - trx.now().getTime();
    if (ahead < LEAST_AHEAD_MS) {
      throw fault('at', 'Enter a time at least 5 seconds ahead: pages are drawn before it.');
    }
    if (ahead > MOST_AHEAD_MS) throw fault('at', 'Enter a time within the next two years.');
    await refuseBeforeEarlier(trx, release, at);
    // A correction is not announced: that would betray it.
    const announced =
      release.revision === 1 &&
      (await announceIn(trx, {
        economy: release.economy_code,
        period: release.period,
        dueAt: at,
        reason,
        by: actor.id,
      }));
    await trx.db
      .updateTable('release')
      .set({
        state: 'scheduled',
        scheduled_for: at,
        scheduled_by: actor.id,
        ready_for: null,
        version: release.version + 1,
      })
      .where('id', '=', id)
      .execute();
    await record(trx, {
      action: 'release.scheduled',
      subject: `release ${id}`,
      detail: { at, announced, ...(reason && { reason }) },
    });
    return true;
  });
  if (!isNew) return;
  await bringUpToDate(ctx);
  const { ready_for } = await ctx.db
    .selectFrom('release')
    .select('ready_for')
    .where('id', '=', id)
    .executeTakeFirstOrThrow();
  if (ready_for?.getTime() !== at.getTime()) {
    throw new ServiceError(
      'conflict',
      'Its pages were not ready at that second. Take it off the schedule and choose a later one.',
    );
  }
}

/** A revision comes out after the one it replaces. */
async function refuseBeforeEarlier(ctx: InTransaction, release: Release, at: Date): Promise<void> {
  const earlier = await ctx.db
    .selectFrom('release')
    .select('id')
    .where('economy_code', '=', release.economy_code)
    .where('period', '=', release.period)
    .where('revision', '<', release.revision)
    .where('scheduled_for', '>=', at)
    .executeTakeFirst();
  if (earlier) throw fault('at', `Enter a time after that of ${earlier.id}.`);
}

function fault(field: string, message: string): ServiceError {
  return new ServiceError('invalid', 'Some fields need another look.', [{ field, message }]);
}
