import type { Db } from '../connection.ts';

/** Announced times after `at`, soonest first; a public fact, so caches may be told of it. */
export async function dueTimes(db: Db, at: Date): Promise<Date[]> {
  const rows = await db
    .selectFrom('announcement')
    .select('due_at')
    .where('due_at', '>', at)
    .where('announced_at', '<=', at)
    .orderBy('due_at')
    .execute();
  return rows.map((row) => row.due_at);
}
