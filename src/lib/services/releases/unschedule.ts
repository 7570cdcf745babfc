import { z } from 'zod';
import { lockPublication } from '../../../../db/queries/publicationLock.ts';
import { bringUpToDate, takeOut } from '../../publication/moments.ts';
import { record } from '../audit.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { requireSecondPair } from './contributors.ts';
import { lockedRelease, requireStep } from './locked.ts';
import { reasonField } from './reason.ts';

/** Every process learns of the change within a second or two: nearer to the moment one might still show it. */
const LEAST_AHEAD_MS = 3_000;

const fields = z.object({ id: z.string(), reason: reasonField });

/** Later moments are drawn again without this one, which takes some seconds: not while another is about to be public. */
const OTHERS_AHEAD_MS = 20_000;

async function refuseBeforeOthers(ctx: InTransaction, id: string, at: Date): Promise<void> {
  const now = ctx.now();
  const next = await ctx.db
    .selectFrom('release')
    .select(['id', 'ready_for'])
    .where('state', '=', 'scheduled')
    .where('id', '<>', id)
    .where('ready_for', '>', now)
    .where('ready_for', '>=', at)
    .where('ready_for', '<', new Date(now.getTime() + OTHERS_AHEAD_MS))
    .limit(1)
    .executeTakeFirst();
  if (next) {
    throw new ServiceError(
      'conflict',
      `${next.id} comes out in a moment and would be late: wait until it is out.`,
    );
  }
}

/** Takes a release off the schedule, with a reason; it is approved as before. Not once it is about to be public. */
export async function unscheduleRelease(
  ctx: ServiceContext,
  input: { id: string; reason: string },
): Promise<void> {
  const actor = requirePermission(ctx.actor, 'releases.unschedule');
  const { id, reason } = parseInput(fields, input);
  await transact(ctx, async (trx) => {
    // Whoever is drawing this moment would else put it in force after it was taken out.
    await lockPublication(trx.db);
    const release = await lockedRelease(trx, id);
    requireStep(trx, release, 'unschedule');
    await requireSecondPair(trx, id, actor);
    const at = release.scheduled_for as Date;
    const isReady = release.ready_for !== null;
    if (isReady && at.getTime() - trx.now().getTime() < LEAST_AHEAD_MS) {
      throw new ServiceError('conflict', 'It is being published in this moment.');
    }
    await refuseBeforeOthers(trx, id, at);
    await trx.db
      .updateTable('release')
      .set({
        state: 'approved',
        scheduled_for: null,
        scheduled_by: null,
        ready_for: null,
        version: release.version + 1,
      })
      .where('id', '=', id)
      .execute();
    await takeOut(trx, at);
    await record(trx, {
      action: 'release.unscheduled',
      subject: `release ${id}`,
      detail: { was: at, reason },
    });
  });
  await bringUpToDate(ctx);
}
