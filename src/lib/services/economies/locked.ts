import { lockEconomy } from '../../../../db/queries/economies.ts';
import type { Economy } from '../../../../db/tables.ts';
import { type InTransaction, ServiceError } from '../context.ts';

/** The economy, locked to the end of the transaction. @throws ServiceError `not_found` */
export async function lockedEconomy(ctx: InTransaction, code: string): Promise<Economy> {
  const economy = await lockEconomy(ctx.db, code);
  if (economy) return economy;
  throw new ServiceError('not_found', `There is no economy ${code}.`, [
    { field: 'economy', message: 'Choose an economy from the list.' },
  ]);
}
