import type { Selectable } from 'kysely';
import type { SeriesTable, Vintage } from '../../../../db/tables.ts';
import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';

export interface VintageValues {
  vintage: Vintage;
  series: {
    id: string;
    concept: SeriesTable['concept'];
    timing: Selectable<SeriesTable>['timing'];
    start: string;
    /** The digits of the file. */
    values: string[];
  }[];
}

/** One vintage with its levels. A look at one that is not public yet is recorded. */
export async function getVintage(ctx: ServiceContext, id: string): Promise<VintageValues> {
  requirePermission(ctx.actor, 'drafts.see');
  return transact(ctx, async (trx) => {
    const vintage = await trx.db
      .selectFrom('vintage')
      .selectAll()
      .where('id', '=', /^\d{1,18}$/.test(id) ? id : '0')
      .executeTakeFirst();
    if (!vintage) throw new ServiceError('not_found', 'There is no such vintage.');
    const series = await trx.db
      .selectFrom('vintage_series')
      .innerJoin('series', 'series.id', 'vintage_series.series_id')
      .select(['series.id', 'series.concept', 'series.timing', 'start', 'values'])
      .where('vintage_id', '=', id)
      .execute();
    if (!vintage.public_from || vintage.public_from > trx.now()) {
      await record(trx, {
        action: 'vintage.viewed',
        subject: `vintage ${id}`,
        detail: { economy: vintage.economy_code },
      });
    }
    return { vintage, series };
  });
}
