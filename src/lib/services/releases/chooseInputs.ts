import { record } from '../audit.ts';
import type { ServiceContext } from '../context.ts';
import { lockedEconomy } from '../economies/locked.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { type ReleaseInputs, checkInputs, noteInputs } from './inputs.ts';
import { lockedRelease, requireDraft, requireVersion } from './locked.ts';

export interface NewInputs extends ReleaseInputs {
  id: string;
  /** The version of the release the person saw. */
  version: number;
}

/** Takes another vintage or specification into a draft; what was computed from the old ones goes. */
export async function chooseInputs(ctx: ServiceContext, input: NewInputs): Promise<void> {
  const actor = requirePermission(ctx.actor, 'releases.draft');
  await transact(ctx, async (trx) => {
    const release = await lockedRelease(trx, input.id);
    requireDraft(release);
    const { vintage_id: vintage, specification_id: specification } = release;
    if (vintage === input.vintageId && specification === input.specificationId) return;
    requireVersion(release, input.version);
    const economy = await lockedEconomy(trx, release.economy_code);
    const made = await checkInputs(trx, economy, release.period, input);
    await trx.db
      .updateTable('release')
      .set({
        vintage_id: input.vintageId,
        specification_id: input.specificationId,
        request: null,
        result: null,
        computed_at: null,
        method_version: null,
        version: release.version + 1,
      })
      .where('id', '=', release.id)
      .execute();
    await noteInputs(trx, release.id, actor.id, made);
    await record(trx, {
      action: 'release.inputs_chosen',
      subject: `release ${release.id}`,
      detail: {
        vintage: { from: vintage, to: input.vintageId },
        specification: { from: specification, to: input.specificationId },
      },
    });
  });
}
