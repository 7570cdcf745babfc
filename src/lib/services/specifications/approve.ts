import { bringUpToDate } from '../../publication/moments.ts';
import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';

/**
 * Approves a specification for use in releases, and draws the pages that name the one in force: a reviewer who did
 * not write it. A second approval changes nothing.
 */
export async function approveSpecification(ctx: ServiceContext, id: string): Promise<void> {
  const actor = requirePermission(ctx.actor, 'specifications.approve');
  await transact(ctx, async (trx) => {
    const specification = await trx.db
      .selectFrom('specification')
      .select(['economy_code', 'version', 'created_by', 'approved_at'])
      .where('id', '=', /^\d{1,18}$/.test(id) ? id : '0')
      .forUpdate()
      .executeTakeFirst();
    if (!specification) throw new ServiceError('not_found', 'There is no such specification.');
    if (specification.created_by === actor.id) {
      throw new ServiceError('forbidden', 'Nobody approves a specification they wrote.');
    }
    if (specification.approved_at) return;
    await trx.db
      .updateTable('specification')
      .set({ approved_at: trx.now(), approved_by: actor.id })
      .where('id', '=', id)
      .execute();
    await record(trx, {
      action: 'specification.approved',
      subject: `specification ${specification.economy_code} version ${specification.version}`,
      detail: { id },
    });
  });
  await bringUpToDate(ctx);
}
