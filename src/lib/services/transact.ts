import type { InTransaction, ServiceContext } from './context.ts';

/** Runs `work` in one transaction: all it changes and its audit rows stand together or not at all. */
export function transact<T>(
  ctx: ServiceContext,
  work: (trx: InTransaction) => Promise<T>,
): Promise<T> {
  return ctx.db.transaction().execute((db) => work({ ...ctx, db }));
}
