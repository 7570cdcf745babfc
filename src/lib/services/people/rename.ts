import { z } from 'zod';
import { record } from '../audit.ts';
import type { ServiceContext } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { transact } from '../transact.ts';
import { personFields } from './insert.ts';
import { requirePermission } from './permissions.ts';

const fields = z.object({ name: personFields.name });

/** Changes one's own name. */
export async function renameSelf(ctx: ServiceContext, input: { name: string }): Promise<void> {
  const actor = requirePermission(ctx.actor, 'account.own');
  const { name } = parseInput(fields, input);
  await transact(ctx, async (trx) => {
    const changed = await trx.db
      .updateTable('person')
      .set({ name, updated_at: trx.now() })
      .where('id', '=', actor.id)
      .where('name', '<>', name)
      .executeTakeFirst();
    if (changed.numUpdatedRows === 0n) return;
    await record(trx, {
      action: 'person.renamed',
      subject: `person ${actor.id}`,
      detail: { from: actor.name, to: name },
    });
  });
}
