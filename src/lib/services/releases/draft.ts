import { record } from '../audit.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { lockedEconomy } from '../economies/locked.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { type ReleaseInputs, checkInputs, noteInputs } from './inputs.ts';
import { stateAt } from './state.ts';

export interface ReleaseDraft extends ReleaseInputs {
  economy: string;
  period: string;
}

/**
 * Opens a draft of the period's first revision, or of the next where the last is published. The reference period is
 * the last of the vintage's money or an earlier one: nothing after it enters the computation.
 */
export async function draftRelease(ctx: ServiceContext, input: ReleaseDraft): Promise<string> {
  const actor = requirePermission(ctx.actor, 'releases.draft');
  return transact(ctx, async (trx) => {
    const economy = await lockedEconomy(trx, input.economy);
    const made = await checkInputs(trx, economy, input.period, input);
    const revision = await nextRevision(trx, input);
    const id = `${economy.code}-${input.period}-r${revision}`;
    await trx.db
      .insertInto('release')
      .values({
        id,
        economy_code: economy.code,
        period: input.period,
        revision,
        state: 'draft',
        vintage_id: input.vintageId,
        specification_id: input.specificationId,
        created_at: trx.now(),
        created_by: actor.id,
      })
      .execute();
    await noteInputs(trx, id, actor.id, made);
    await record(trx, {
      action: 'release.drafted',
      subject: `release ${id}`,
      detail: { vintage: input.vintageId, specification: input.specificationId },
    });
    return id;
  });
}

async function nextRevision(ctx: InTransaction, input: ReleaseDraft): Promise<number> {
  const last = await ctx.db
    .selectFrom('release')
    .select(['id', 'revision', 'state', 'ready_for'])
    .where('economy_code', '=', input.economy)
    .where('period', '=', input.period)
    .orderBy('revision', 'desc')
    .limit(1)
    .executeTakeFirst();
  if (!last) return 1;
  if (stateAt(last, ctx.now()) === 'published') return last.revision + 1;
  throw new ServiceError('conflict', `Release ${last.id} is not published yet: work on that one.`, [
    { field: 'period', message: `${last.id} exists and is not published yet.` },
  ]);
}
