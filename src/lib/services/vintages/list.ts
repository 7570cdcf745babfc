import { sql } from 'kysely';
import { addPeriods } from '../../econ/periods.ts';
import type { ServiceContext } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';

export interface VintageSummary {
  id: string;
  economyCode: string;
  economyName: string;
  fileName: string;
  /** Bytes. */
  fileSize: number;
  note: string;
  sourcePublishedAt: Date;
  knownFrom: Date;
  /** When a release first made it public; null until then. */
  publicFrom: Date | null;
  loadedBy: string;
  series: { concept: string; first: string; last: string; periods: number }[];
}

/** Vintages of all economies or one, the latest at the source first. */
export async function listVintages(
  ctx: ServiceContext,
  economy?: string,
): Promise<VintageSummary[]> {
  requirePermission(ctx.actor, 'drafts.see');
  let query = ctx.db
    .selectFrom('vintage as v')
    .innerJoin('economy as e', 'e.code', 'v.economy_code')
    .innerJoin('person as p', 'p.id', 'v.loaded_by')
    .selectAll('v')
    .select(['e.name as economy_name', 'p.name as person_name'])
    .orderBy('e.name')
    .orderBy('v.source_published_at', 'desc')
    .orderBy('v.id', 'desc');
  if (economy) query = query.where('v.economy_code', '=', economy);
  const vintages = await query.execute();
  const series = await ctx.db
    .selectFrom('vintage_series as vs')
    .innerJoin('series as s', 's.id', 'vs.series_id')
    .select([
      'vs.vintage_id',
      's.concept',
      'vs.start',
      sql<number>`cardinality(vs."values")`.as('periods'),
    ])
    .orderBy(sql`array_position(array['money', 'prices', 'activity'], s.concept)`)
    .execute();
  return vintages.map((row) => ({
    id: row.id,
    economyCode: row.economy_code,
    economyName: row.economy_name,
    fileName: row.file_name,
    fileSize: Number(row.file_size),
    note: row.note,
    sourcePublishedAt: row.source_published_at,
    knownFrom: row.known_from,
    publicFrom: row.public_from,
    loadedBy: row.person_name,
    series: series
      .filter((one) => one.vintage_id === row.id)
      .map(({ concept, start, periods }) => ({
        concept,
        first: start,
        last: addPeriods(start, periods - 1),
        periods,
      })),
  }));
}
