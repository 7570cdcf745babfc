import { z } from 'zod';
import { frequencyOf, PERIOD_FORM } from '../../econ/periods.ts';
import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { lockedEconomy } from '../economies/locked.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { parseAssumptions } from './assumptions.ts';

const draft = z.object({
  economy: z.string(),
  reason: z
    .string()
    .trim()
    .min(1, 'Say why this specification is chosen: readers see it.')
    .max(2000, 'Use at most 2,000 characters.'),
  holdsFrom: z.string().trim(),
  assumptions: z.unknown(),
});

export interface SpecificationDraft {
  economy: string;
  /** Why; readers see it. */
  reason: string;
  /** The first reference period it is for. */
  holdsFrom: string;
  /** The contract's assumptions; of any shape, they are checked. */
  assumptions: unknown;
}

/** The next version of an economy's specification; a reviewer approves it before a release may use it. */
export async function draftSpecification(
  ctx: ServiceContext,
  input: SpecificationDraft,
): Promise<{ id: string; version: number }> {
  const actor = requirePermission(ctx.actor, 'specifications.draft');
  const { economy: code, reason, holdsFrom, assumptions } = parseInput(draft, input);
  return transact(ctx, async (trx) => {
    const { frequency } = await lockedEconomy(trx, code);
    if (frequencyOf(holdsFrom) !== frequency) {
      throw new ServiceError('invalid', 'Some fields need another look.', [
        { field: 'holdsFrom', message: `Enter ${PERIOD_FORM[frequency]}.` },
      ]);
    }
    const parsed = parseAssumptions(assumptions, frequency);
    const newest = await trx.db
      .selectFrom('specification')
      .select('version')
      .where('economy_code', '=', code)
      .orderBy('version', 'desc')
      .limit(1)
      .executeTakeFirst();
    const version = (newest?.version ?? 0) + 1;
    const { id } = await trx.db
      .insertInto('specification')
      .values({
        economy_code: code,
        version,
        assumptions: JSON.stringify(parsed),
        reason,
        holds_from: holdsFrom,
        created_at: trx.now(),
        created_by: actor.id,
        approved_at: null,
        approved_by: null,
      })
      .returning('id')
      .executeTakeFirstOrThrow();
    await record(trx, {
      action: 'specification.drafted',
      subject: `specification ${code} version ${version}`,
      detail: { id, assumptions: parsed, reason, holdsFrom },
    });
    return { id, version };
  });
}
