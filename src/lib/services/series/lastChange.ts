import { sql } from 'kysely';
import type { Db } from '../../../../db/connection.ts';
import { isVisible } from '../releases/visible.ts';
import type { View } from '../view.ts';

/**
 * The latest instant at which anything that readers see changed: a release, an announced date, the passing of one,
 * or a specification. Null while nothing has happened yet.
 */
export async function lastChange(db: Db, view: View): Promise<Date | null> {
  const row = await db
    .selectNoFrom((eb) => [
      sql<Date | null>`greatest(
        ${eb
          .selectFrom('release')
          .select((release) => release.fn.max('release.scheduled_for').as('at'))
          .where(isVisible(view))},
        ${eb
          .selectFrom('announcement')
          .select((row) => row.fn.max('announced_at').as('at'))
          .where('announced_at', '<=', view.at)},
        ${eb
          .selectFrom('announcement')
          .select((row) => row.fn.max('due_at').as('at'))
          .where('announced_at', '<=', view.at)
          .where('due_at', '<=', view.at)},
        ${eb
          .selectFrom('specification')
          .select((row) => row.fn.max('approved_at').as('at'))
          .where('approved_at', '<=', view.at)}
      )`.as('at'),
    ])
    .executeTakeFirst();
  return row?.at ?? null;
}
