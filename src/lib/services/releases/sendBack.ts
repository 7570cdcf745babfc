import { z } from 'zod';
import { record } from '../audit.ts';
import type { ServiceContext } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { requireSecondPair } from './contributors.ts';
import { lockedRelease, requireStep } from './locked.ts';
import { reasonField } from './reason.ts';

const fields = z.object({ id: z.string(), reason: reasonField });

/** Returns a release to draft with the reason; what its approval had frozen goes. */
export async function sendBackRelease(
  ctx: ServiceContext,
  input: { id: string; reason: string },
): Promise<void> {
  const actor = requirePermission(ctx.actor, 'releases.sendBack');
  const { id, reason } = parseInput(fields, input);
  await transact(ctx, async (trx) => {
    const release = await lockedRelease(trx, id);
    requireStep(trx, release, 'sendBack');
    await requireSecondPair(trx, id, actor);
    await trx.db.deleteFrom('release_value').where('release_id', '=', id).execute();
    await trx.db.deleteFrom('release_artefact').where('release_id', '=', id).execute();
    await trx.db
      .updateTable('release')
      .set({
        state: 'draft',
        returned_reason: reason,
        approved_at: null,
        approved_by: null,
        version: release.version + 1,
      })
      .where('id', '=', id)
      .execute();
    await record(trx, {
      action: 'release.sent_back',
      subject: `release ${id}`,
      detail: { from: release.state, reason },
    });
  });
}
