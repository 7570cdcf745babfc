import { sql } from 'kysely';
import type { Db } from '../connection.ts';

/**
 * Economies whose announced dates or specification have changed, up to `at`, since the drawing began of their page in
 * force at `drawnUntil`, or of a coming one of the site; those that are announced and have no page yet among them.
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
    left join lateral (
      select published.drawn_at as at from published
      join moment on moment.visible_from = published.visible_from and moment.ready
      where published.address = '/economies/' || economy.code || '/'
        and published.visible_from <= ${drawnUntil}
      order by published.visible_from desc
      limit 1
    ) drawn on true
    cross join lateral (
      -- every coming page of the site names the dates of every economy
      select min(published.drawn_at) as at from published
      join moment on moment.visible_from = published.visible_from and moment.ready
      where published.address = '/' and published.visible_from > ${drawnUntil}
    ) coming
    where announced.at is not null
      and greatest(announced.at, specified.at)
        > least(coalesce(drawn.at, '-infinity'), coming.at)
    order by economy.code
  `.execute(db);
  return rows.map((row) => row.code);
}
