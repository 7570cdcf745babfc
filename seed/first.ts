import { sql } from 'kysely';
import { migrate } from '../db/migrate.ts';
import type { Runtime } from '../src/lib/runtime.ts';
import { writeAccounts } from './accounts.ts';
import { type SeedOptions, seedDemo } from './seed.ts';

/** Less than the whole demo: fewer economies or months. */
export type SeedSize = Pick<SeedOptions, 'economies' | 'months' | 'full'>;

const LOCK = 7_305_002;

/**
 * Seeds the demo into a database nobody has used yet; of several processes that start at once only one does.
 * A seeding that was broken off is begun again: nobody can have worked in it, since nothing answers before it ends.
 * Whatever else is in the database stays as it is.
 */
export async function seedWhereEmpty(
  runtime: Runtime,
  onProgress: (text: string) => void,
  size: SeedSize = {},
): Promise<void> {
  const { db, clock, env } = runtime;
  await db.connection().execute(async (connection) => {
    await sql`select pg_advisory_lock(${LOCK})`.execute(connection);
    try {
      const begun = await db.selectFrom('demo_seed').selectAll().executeTakeFirst();
      if (begun?.finished_at) return;
      if (begun) {
        onProgress('The first seeding was broken off; beginning it again');
        await sql`drop schema public cascade`.execute(db);
        await sql`create schema public`.execute(db);
        await migrate(db);
      }
      const anyone = await db.selectFrom('person').select('id').limit(1).executeTakeFirst();
      if (anyone) return;
      await db.insertInto('demo_seed').values({ started_at: clock.now() }).execute();
      const accounts = await seedDemo(runtime, { ...size, now: clock.now(), onProgress });
      await writeAccounts(env.dataDir, accounts);
      await db.updateTable('demo_seed').set({ finished_at: clock.now() }).execute();
    } finally {
      await sql`select pg_advisory_unlock(${LOCK})`.execute(connection);
    }
  });
}
