import type { Selectable, Transaction } from 'kysely';
import type { Database, EconomyTable } from '../tables.ts';

/** The economy, locked: numbering of what belongs to it waits for this transaction. */
export function lockEconomy(
  trx: Transaction<Database>,
  code: string,
): Promise<Selectable<EconomyTable> | undefined> {
  return trx
    .selectFrom('economy')
    .selectAll()
    .where('code', '=', code)
    .forUpdate()
    .executeTakeFirst();
}
