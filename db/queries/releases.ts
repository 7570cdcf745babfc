import type { Transaction } from 'kysely';
import type { Database, Release } from '../tables.ts';

/** The release, locked: nobody else changes its state before this transaction ends. */
export function lockRelease(trx: Transaction<Database>, id: string): Promise<Release | undefined> {
  return trx.selectFrom('release').selectAll().where('id', '=', id).forUpdate().executeTakeFirst();
}
