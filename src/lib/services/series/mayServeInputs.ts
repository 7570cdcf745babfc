import type { Db } from '../../../../db/connection.ts';

/** Whether the licence of every input series of an economy lets us serve its values. */
export async function mayServeInputs(db: Db, economy: string): Promise<boolean> {
  const withheld = await db
    .selectFrom('series')
    .select('id')
    .where('economy_code', '=', economy)
    .where('serve_values', '=', false)
    .limit(1)
    .executeTakeFirst();
  return withheld === undefined;
}
