import { keepFrozen, prepareFreeze } from '../../publication/freeze.ts';
import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { requireSecondPair } from './contributors.ts';
import { lockedRelease, requireStep, requireVersion } from './locked.ts';
import { stateAt } from './state.ts';

/**
 * Approves a release as it was seen, and freezes its values, images and files. By a reviewer who changed nothing of
 * it; a second approval changes nothing.
 */
export async function approveRelease(
  ctx: ServiceContext,
  input: { id: string; version: number },
): Promise<void> {
  const actor = requirePermission(ctx.actor, 'releases.approve');
  const { id } = input;
  await requireSecondPair(ctx, id, actor);
  const seen = await ctx.db
    .selectFrom('release')
    .select(['state', 'ready_for'])
    .where('id', '=', id)
    .executeTakeFirst();
  if (!seen) throw new ServiceError('not_found', `There is no release ${id}.`);
  // Drawing takes seconds: not while the row is locked, and not for a release that is no longer in review.
  const frozen = stateAt(seen, ctx.now()) === 'in_review' ? await prepareFreeze(ctx, id) : null;
  await transact(ctx, async (trx) => {
    const release = await lockedRelease(trx, id);
    if (release.state === 'approved' && release.approved_by === actor.id) return;
    requireStep(trx, release, 'approve');
    requireVersion(release, input.version);
    await requireSecondPair(trx, id, actor);
    if (!frozen) throw new ServiceError('conflict', 'The release has just changed. Look again.');
    await keepFrozen(trx, frozen);
    await trx.db
      .updateTable('release')
      .set({
        state: 'approved',
        approved_at: trx.now(),
        approved_by: actor.id,
        version: release.version + 1,
      })
      .where('id', '=', id)
      .execute();
    await record(trx, { action: 'release.approved', subject: `release ${id}` });
  });
}
