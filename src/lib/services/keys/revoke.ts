import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { may, requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';

/**
 * Ends a key for good: the owner's own, or anybody's where an administrator asks. Every process refuses it within a
 * second (verify.ts keeps what it knows no longer). To others than these a key that is not theirs does not exist.
 */
export async function revokeKey(ctx: ServiceContext, id: string): Promise<void> {
  const { id: actorId } = requirePermission(ctx.actor, 'account.own');
  const anybodys = may(ctx.actor, 'keys.revokeOthers');
  await transact(ctx, async (trx) => {
    let change = trx.db
      .updateTable('api_key')
      .set({ enabled: false, updated_at: trx.now() })
      .where('id', '=', id)
      .where('enabled', '=', true);
    if (!anybodys) change = change.where('person_id', '=', actorId);
    const revoked = await change.returning(['name', 'person_id']).executeTakeFirst();
    if (!revoked)
      throw new ServiceError('not_found', 'There is no such key, or it is revoked already.');
    await record(trx, {
      action: 'key.revoked',
      subject: `key ${id}`,
      detail: { name: revoked.name, owner: revoked.person_id },
    });
  });
}
