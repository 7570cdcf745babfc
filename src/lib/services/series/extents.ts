import type { Db } from '../../../../db/connection.ts';
import { addPeriods, comparePeriods } from '../../econ/periods.ts';
import { isVisible, publishedAt } from '../releases/visible.ts';
import type { View } from '../view.ts';

/** First and last period with a value; null where no period has one. */
export interface Extent {
  firstPeriod: string | null;
  lastPeriod: string | null;
}

/** What an extent is known from. */
export interface DatedExtent extends Extent {
  lastUpdated: Date;
  releaseId: string;
}

const COLUMNS = ['value', 'lower', 'upper'] as const;

/** Extents of what these releases hold, by `{release} {indicator} {column}`. */
export async function latestExtents(db: Db, releases: string[]): Promise<Map<string, Extent>> {
  if (releases.length === 0) return new Map();
  const rows = await db
    .selectFrom('release_value')
    .select(['release_id', 'indicator'])
    .select((eb) =>
      COLUMNS.flatMap((column) => [
        eb.fn.min('period').filterWhere(column, 'is not', null).as(`${column}_first`),
        eb.fn.max('period').filterWhere(column, 'is not', null).as(`${column}_last`),
      ]),
    )
    .where('release_id', 'in', releases)
    .groupBy(['release_id', 'indicator'])
    .execute();
  return new Map(
    rows.flatMap((row) =>
      COLUMNS.map((column) => [
        `${row.release_id} ${row.indicator} ${column}`,
        {
          firstPeriod: row[`${column}_first`] as string | null,
          lastPeriod: row[`${column}_last`] as string | null,
        },
      ]),
    ),
  );
}

/** Extents of what was first published of each indicator, by `{economy} {indicator}`. */
export async function firstExtents(
  db: Db,
  view: View,
  economies: string[],
): Promise<Map<string, DatedExtent>> {
  if (economies.length === 0) return new Map();
  const rows = await db
    .selectFrom('release')
    .innerJoin('release_value', (join) =>
      join
        .onRef('release_value.release_id', '=', 'release.id')
        .onRef('release_value.period', '=', 'release.period'),
    )
    .select([
      'release.id',
      'release.economy_code',
      'release.period',
      'release_value.indicator',
      'release_value.value',
      publishedAt(view).as('published_at'),
    ])
    .where(isVisible(view))
    .where('release.economy_code', 'in', economies)
    .where('release.revision', '=', 1)
    .where('release_value.indicator', 'in', ['money_surprise', 'implied_gap'])
    .orderBy('release.period')
    .execute();
  const extents = new Map<string, DatedExtent>();
  for (const row of rows) {
    const key = `${row.economy_code} ${row.indicator}`;
    const known = extents.get(key);
    const here = row.value === null ? null : row.period;
    const isNewer = !known || row.published_at > known.lastUpdated;
    extents.set(key, {
      firstPeriod: known?.firstPeriod ?? here,
      lastPeriod: here ?? known?.lastPeriod ?? null,
      lastUpdated: isNewer ? row.published_at : known.lastUpdated,
      releaseId: isNewer ? row.id : known.releaseId,
    });
  }
  return extents;
}

/** A vintage of one series that readers may see up to `lastPeriod`, and the release that made it public so far. */
export interface ServedVintage extends DatedExtent {
  vintageId: string;
  firstPeriod: string;
  lastPeriod: string;
}

/**
 * By series id, the vintage readers see: of those a visible release has frozen, the one that is public furthest, and
 * of these the one whose source is the latest. It is found by its releases and not by `public_from`, so that a
 * rehearsed moment shows it too.
 *
 * A release makes its vintage public up to its own reference period and no further: what the file holds beyond
 * belongs to a release still to come. Hence a correction of an older month does not take the place of a vintage that
 * reaches a newer one.
 */
export async function servedVintages(
  db: Db,
  view: View,
  economies: string[],
): Promise<Map<string, ServedVintage>> {
  if (economies.length === 0) return new Map();
  const frozen = db
    .selectFrom('release')
    .distinctOn('release.vintage_id')
    .select([
      'release.vintage_id',
      'release.id',
      'release.period',
      publishedAt(view).as('published_at'),
    ])
    .where(isVisible(view))
    .where('release.economy_code', 'in', economies)
    .orderBy('release.vintage_id')
    .orderBy('release.period', 'desc')
    .orderBy('published_at')
    .orderBy('release.id');
  const rows = await db
    .selectFrom(frozen.as('frozen'))
    .innerJoin('vintage', 'vintage.id', 'frozen.vintage_id')
    .innerJoin('vintage_series', 'vintage_series.vintage_id', 'vintage.id')
    .distinctOn('vintage_series.series_id')
    .select([
      'vintage_series.series_id',
      'vintage_series.vintage_id',
      'vintage_series.start',
      'frozen.id',
      'frozen.period',
      'frozen.published_at',
    ])
    .select((eb) => eb.fn<number>('cardinality', ['vintage_series.values']).as('count'))
    .whereRef('vintage_series.start', '<=', 'frozen.period')
    .orderBy('vintage_series.series_id')
    .orderBy('frozen.period', 'desc')
    .orderBy('vintage.source_published_at', 'desc')
    .orderBy('vintage.id', 'desc')
    .execute();
  return new Map(
    rows.map((row) => {
      const held = addPeriods(row.start, row.count - 1);
      return [
        row.series_id,
        {
          vintageId: row.vintage_id,
          firstPeriod: row.start,
          lastPeriod: comparePeriods(held, row.period) > 0 ? row.period : held,
          lastUpdated: row.published_at,
          releaseId: row.id,
        },
      ];
    }),
  );
}
