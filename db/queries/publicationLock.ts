import { type Transaction, sql } from 'kysely';
import type { Database } from '../tables.ts';

/** The advisory lock under which coming moments are drawn and put in force; the one of src/lib/publication/moments.ts. */
export const PUBLICATION_LOCK = 7_305_001;

/** Waits until nobody draws, and keeps others from it to the end of the transaction. Take it before any row. */
export async function lockPublication(trx: Transaction<Database>): Promise<void> {
  await sql`select pg_advisory_xact_lock(${PUBLICATION_LOCK})`.execute(trx);
}
