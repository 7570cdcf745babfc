import { record } from '../audit.ts';
import { type Role, type ServiceContext, ServiceError } from '../context.ts';
import { transact } from '../transact.ts';
import { requirePermission } from './permissions.ts';

/** Gives a person another role, and ends their sessions so that it holds at once. Nobody changes their own. */
export async function setRole(
  ctx: ServiceContext,
  input: { personId: string; role: Role },
): Promise<void> {
  const actor = requirePermission(ctx.actor, 'people.manage');
  if (actor.id === input.personId) {
    throw new ServiceError('forbidden', 'Nobody changes their own role.');
  }
  await transact(ctx, async (trx) => {
    const person = await trx.db
      .selectFrom('person')
      .select('role')
      .where('id', '=', input.personId)
      .forUpdate()
      .executeTakeFirst();
    if (!person) throw new ServiceError('not_found', 'There is no such person.');
    if (person.role === input.role) return;
    await trx.db
      .updateTable('person')
      .set({ role: input.role, updated_at: trx.now() })
      .where('id', '=', input.personId)
      .execute();
    await trx.db.deleteFrom('session').where('person_id', '=', input.personId).execute();
    await record(trx, {
      action: 'person.role_set',
      subject: `person ${input.personId}`,
      detail: { from: person.role, to: input.role },
    });
  });
}
