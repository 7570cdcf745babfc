import { sql } from 'kysely';
import type { Db } from '../../../db/connection.ts';
import { PUBLICATION_LOCK } from '../../../db/queries/publicationLock.ts';

/** The end of the queue of those in this process who want the lock, for each database. */
const queues = new WeakMap<Db, Promise<unknown>>();

/** One at a time: here by a queue, so that waiting takes no connection, and among processes by the advisory lock. */
export async function exclusively<T>(db: Db, work: () => Promise<T>): Promise<T> {
  const before = queues.get(db) ?? Promise.resolve();
  const mine = before.catch(() => {}).then(() => withLock(db, work));
  queues.set(db, mine);
  return mine;
}

function withLock<T>(db: Db, work: () => Promise<T>): Promise<T> {
  return db.connection().execute(async (connection) => {
    await sql`select pg_advisory_lock(${PUBLICATION_LOCK})`.execute(connection);
    try {
      return await work();
    } finally {
      // A connection that broke has given the lock back already.
      await sql`select pg_advisory_unlock(${PUBLICATION_LOCK})`.execute(connection).catch(() => {});
    }
  });
}
