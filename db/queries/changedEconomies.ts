import { sql } from 'kysely';
import type { Db } from '../connection.ts';

/**
 * Economies whose announced dates or specification have changed, up to `at`, since the page was drawn that is in
 * force at `drawnUntil`; those that are announced and have no page yet among them.
 */
export async function changedEconomies(db: Db, at: Date, drawnUntil: Date): Promise<string[]> {
  const { rows } = await sql<{ code: string }>`
    select economy.code
    from economy
    cross join lateral (
      select max(announced_at) as at from announcement
      where economy_code = economy.code and announced_at <= ${at}
    ) announced
    cross join lateral (
      select max(approved_at) as at from specification
      where economy_code = economy.code and approved_at <= ${at}
    ) specified
    cross join lateral (
      select max(published.visible_from) as at from published
      join moment on moment.visible_from = published.visible_from and moment.ready
      where published.address = '/economies/' || economy.code || '/'
        and published.visible_from <= ${drawnUntil}
    ) drawn
    where announced.at is not null
      and greatest(announced.at, specified.at) > coalesce(drawn.at, '-infinity')
    order by economy.code
  `.execute(db);
  return rows.map((row) => row.code);
}
