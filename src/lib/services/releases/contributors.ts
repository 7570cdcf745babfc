import type { ReleaseContributorTable } from '../../../../db/tables.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import type { SignedIn } from '../people/permissions.ts';

type Part = ReleaseContributorTable['part'];

const IN_WORDS: Record<Part, string> = {
  data: 'loaded its data',
  specification: 'chose or wrote its specification',
  words: 'wrote words of it',
};

/** Notes who made a part of the revision: they may never approve it. */
export async function addContributor(
  ctx: InTransaction,
  releaseId: string,
  personId: string,
  part: Part,
): Promise<void> {
  await ctx.db
    .insertInto('release_contributor')
    .values({ release_id: releaseId, person_id: personId, part })
    .onConflict((conflict) => conflict.doNothing())
    .execute();
}

/** Why this person may not decide on the revision; null where they may: they changed nothing of it. */
export async function whyNotSecondPair(
  ctx: Pick<ServiceContext, 'db'> | InTransaction,
  releaseId: string,
  personId: string,
): Promise<string | null> {
  const part = await ctx.db
    .selectFrom('release_contributor')
    .select('part')
    .where('release_id', '=', releaseId)
    .where('person_id', '=', personId)
    .orderBy('part')
    .limit(1)
    .executeTakeFirst();
  if (!part) return null;
  return `You ${IN_WORDS[part.part]}: somebody who changed nothing of this revision decides on it.`;
}

/** @throws ServiceError `forbidden` where the person contributed to the revision. */
export async function requireSecondPair(
  ctx: Pick<ServiceContext, 'db'> | InTransaction,
  releaseId: string,
  actor: SignedIn,
): Promise<void> {
  const reason = await whyNotSecondPair(ctx, releaseId, actor.id);
  if (reason) throw new ServiceError('forbidden', reason);
}
