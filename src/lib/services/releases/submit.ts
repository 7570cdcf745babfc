import type { Release } from '../../../../db/tables.ts';
import { record } from '../audit.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { lockedRelease, requireStep } from './locked.ts';

/**
 * Hands a draft to review: computed, with headline and explainer, under an approved specification. A second submission changes nothing.
 * @throws ServiceError `invalid` with everything that is missing
 */
export async function submitRelease(ctx: ServiceContext, id: string): Promise<void> {
  const actor = requirePermission(ctx.actor, 'releases.submit');
  await transact(ctx, async (trx) => {
    const release = await lockedRelease(trx, id);
    if (release.state === 'in_review') return;
    requireStep(trx, release, 'submit');
    const missing = missingFor(release, await isSpecificationApproved(trx, release));
    if (missing.length > 0) {
      throw new ServiceError('invalid', 'The release is not ready for review.', missing);
    }
    await trx.db
      .updateTable('release')
      .set({
        state: 'in_review',
        submitted_at: trx.now(),
        submitted_by: actor.id,
        returned_reason: null,
        version: release.version + 1,
      })
      .where('id', '=', id)
      .execute();
    await record(trx, { action: 'release.submitted', subject: `release ${id}` });
  });
}

/** What a draft still needs before review, a fault each. */
export function missingFor(
  release: Pick<Release, 'result' | 'headline' | 'explainer'>,
  isApproved: boolean,
): { field: string; message: string }[] {
  const missing: { field: string; message: string }[] = [];
  if (!release.result) missing.push({ field: 'compute', message: 'Compute the release.' });
  if (!release.headline) missing.push({ field: 'headline', message: 'Write a headline.' });
  if (!release.explainer) missing.push({ field: 'explainer', message: 'Write the explainer.' });
  if (!isApproved) {
    missing.push({
      field: 'specification',
      message: 'Have the specification approved by a reviewer.',
    });
  }
  return missing;
}

async function isSpecificationApproved(ctx: InTransaction, release: Release): Promise<boolean> {
  const { approved_at } = await ctx.db
    .selectFrom('specification')
    .select('approved_at')
    .where('id', '=', release.specification_id)
    .executeTakeFirstOrThrow();
  return approved_at !== null;
}
