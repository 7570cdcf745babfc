import { Migrator } from 'kysely';
import type { Db } from './connection.ts';
import { migrations } from './migrations/index.ts';

function migrator(db: Db): Migrator {
  return new Migrator({ db, provider: { getMigrations: async () => migrations } });
}

/** Runs what has not run yet, under Kysely's lock; answers the names it ran. Throws the first failure. */
export async function migrate(db: Db): Promise<string[]> {
  const { error, results } = await migrator(db).migrateToLatest();
  const failed = results?.find((result) => result.status === 'Error');
  if (error) {
    const name = failed ? `Migration ${failed.migrationName}` : 'Migration';
    throw new Error(`${name} failed: ${error instanceof Error ? error.message : String(error)}`, {
      cause: error,
    });
  }
  return results?.map((result) => result.migrationName) ?? [];
}

/** Whether the database has run every migration of this build. */
export async function isMigrated(db: Db): Promise<boolean> {
  const known = await migrator(db).getMigrations();
  return known.every((migration) => migration.executedAt !== undefined);
}
