import { record } from '../audit.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { stateAt } from './state.ts';

/** Where somebody looks at a release before it is out. */
export type Place = 'desk' | 'preview';

/** Records a look at a release that is not public yet: everybody who could see it before its second is known. */
export async function recordView(
  ctx: ServiceContext,
  input: { id: string; place: Place },
): Promise<void> {
  requirePermission(ctx.actor, 'drafts.see');
  await transact(ctx, (trx) => recordViewIn(trx, input));
}

/** The same inside the transaction that reads. */
export async function recordViewIn(
  ctx: InTransaction,
  { id, place }: { id: string; place: Place },
): Promise<void> {
  const release = await ctx.db
    .selectFrom('release')
    .select(['state', 'ready_for', 'version'])
    .where('id', '=', id)
    .executeTakeFirst();
  if (!release) throw new ServiceError('not_found', `There is no release ${id}.`);
  const state = stateAt(release, ctx.now());
  if (state === 'published') return;
  await record(ctx, {
    action: 'release.viewed',
    subject: `release ${id}`,
    detail: { place, state, version: release.version },
  });
}
