import type { Economy, Series } from '../../../../db/tables.ts';
import type { ServiceContext } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';

export interface DeskEconomy extends Economy {
  series: Series[];
}

/** Every economy with its input series, by name, whether it has published anything or not. */
export async function listDeskEconomies(ctx: ServiceContext): Promise<DeskEconomy[]> {
  requirePermission(ctx.actor, 'drafts.see');
  const [economies, series] = await Promise.all([
    ctx.db.selectFrom('economy').selectAll().orderBy('name').execute(),
    ctx.db.selectFrom('series').selectAll().orderBy('created_at').orderBy('id').execute(),
  ]);
  return economies.map((economy) => ({
    ...economy,
    series: series.filter((row) => row.economy_code === economy.code),
  }));
}
