import { type Role, type ServiceContext, ServiceError } from '../context.ts';
import { requirePermission } from './permissions.ts';

export interface Profile {
  name: string;
  email: string;
  role: Role;
  createdAt: Date;
}

/** Who the person signed in is. */
export async function getProfile(ctx: ServiceContext): Promise<Profile> {
  const actor = requirePermission(ctx.actor, 'account.own');
  const person = await ctx.db
    .selectFrom('person')
    .select(['name', 'email', 'role', 'created_at as createdAt'])
    .where('id', '=', actor.id)
    .executeTakeFirst();
  if (!person) throw new ServiceError('not_found', 'This account is gone.');
  return person;
}
