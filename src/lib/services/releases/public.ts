import type { Db } from '../../../../db/connection.ts';
import type { Assumptions, ComputeRequest, ComputeResult } from '../../econ/types.ts';
import { mayServeInputs } from '../series/mayServeInputs.ts';
import type { View } from '../view.ts';
import { isVisible, publishedAt } from './visible.ts';

/** A public release in a list. */
export interface ReleaseSummary {
  id: string;
  economyCode: string;
  economyName: string;
  economyNameInText: string;
  frequency: 'monthly' | 'quarterly' | 'annual';
  period: string;
  revision: number;
  headline: string;
  publishedAt: Date;
}

/** A public release with all that was frozen with it. */
export interface PublicRelease extends ReleaseSummary {
  explainer: string;
  contact: string;
  currency: string;
  request: ComputeRequest;
  result: ComputeResult;
  methodVersion: string;
  specification: { version: number; assumptions: Assumptions; reason: string; holdsFrom: string };
  vintage: { id: string; sourcePublishedAt: Date };
  /** Whether its request, inputs and bundle are public: every licence lets us serve the input values. */
  servesInputs: boolean;
}

export interface ReleaseFilter {
  economy?: string;
  period?: string;
  limit?: number;
}

/**
 * The standing releases of a view, newest first: of each economy and period the greatest revision.
 * `limit` cuts the list after sorting by time of publication.
 */
export async function listReleases(
  db: Db,
  view: View,
  filter: ReleaseFilter = {},
): Promise<ReleaseSummary[]> {
  let standing = db
    .selectFrom('release')
    .innerJoin('economy', 'economy.code', 'release.economy_code')
    .distinctOn(['release.economy_code', 'release.period'])
    .select([
      'release.id',
      'release.economy_code as economyCode',
      'economy.name as economyName',
      'economy.name_in_text as economyNameInText',
      'economy.frequency',
      'release.period',
      'release.revision',
      'release.headline',
      publishedAt(view).as('publishedAt'),
    ])
    .where(isVisible(view))
    .orderBy('release.economy_code')
    .orderBy('release.period')
    .orderBy('release.revision', 'desc');
  if (filter.economy) standing = standing.where('release.economy_code', '=', filter.economy);
  if (filter.period) standing = standing.where('release.period', '=', filter.period);
  let list = db
    .selectFrom(standing.as('standing'))
    .selectAll()
    .orderBy('publishedAt', 'desc')
    .orderBy('period', 'desc')
    .orderBy('economyCode');
  if (filter.limit) list = list.limit(filter.limit);
  return list.execute();
}

/** One public release of an economy and period: the named revision, or the standing one. Null where there is none. */
export async function getRelease(
  db: Db,
  view: View,
  which: { economy: string; period: string; revision?: number },
): Promise<PublicRelease | null> {
  let query = db
    .selectFrom('release')
    .innerJoin('economy', 'economy.code', 'release.economy_code')
    .innerJoin('specification', 'specification.id', 'release.specification_id')
    .innerJoin('vintage', 'vintage.id', 'release.vintage_id')
    .select([
      'release.id',
      'release.economy_code',
      'economy.name',
      'economy.name_in_text',
      'economy.frequency',
      'economy.contact',
      'economy.currency',
      'release.period',
      'release.revision',
      'release.headline',
      'release.explainer',
      'release.request',
      'release.result',
      'release.method_version',
      'specification.version as specification_version',
      'specification.assumptions',
      'specification.reason',
      'specification.holds_from',
      'vintage.id as vintage_id',
      'vintage.source_published_at',
      publishedAt(view).as('published_at'),
    ])
    .where(isVisible(view))
    .where('release.economy_code', '=', which.economy)
    .where('release.period', '=', which.period);
  if (which.revision) query = query.where('release.revision', '=', which.revision);
  const row = await query.orderBy('release.revision', 'desc').limit(1).executeTakeFirst();
  if (!row?.request || !row.result) return null;
  return {
    id: row.id,
    economyCode: row.economy_code,
    economyName: row.name,
    economyNameInText: row.name_in_text,
    frequency: row.frequency,
    contact: row.contact,
    currency: row.currency,
    period: row.period,
    revision: row.revision,
    headline: row.headline,
    explainer: row.explainer,
    publishedAt: row.published_at,
    request: row.request as ComputeRequest,
    result: row.result as ComputeResult,
    methodVersion: row.method_version ?? '',
    specification: {
      version: row.specification_version,
      assumptions: row.assumptions as Assumptions,
      reason: row.reason,
      holdsFrom: row.holds_from,
    },
    vintage: { id: row.vintage_id, sourcePublishedAt: row.source_published_at },
    servesInputs: await mayServeInputs(db, row.economy_code),
  };
}

/** The release that carries an economy's latest history: greatest period, then greatest revision. */
export async function latestRelease(
  db: Db,
  view: View,
  economy: string,
): Promise<PublicRelease | null> {
  const newest = await db
    .selectFrom('release')
    .select('release.period')
    .where(isVisible(view))
    .where('release.economy_code', '=', economy)
    .orderBy('release.period', 'desc')
    .limit(1)
    .executeTakeFirst();
  return newest ? getRelease(db, view, { economy, period: newest.period }) : null;
}

/** All public releases of one economy and period, first revision first. */
export async function listRevisions(
  db: Db,
  view: View,
  which: { economy: string; period: string },
): Promise<{ id: string; revision: number; publishedAt: Date }[]> {
  return db
    .selectFrom('release')
    .select(['release.id', 'release.revision', publishedAt(view).as('publishedAt')])
    .where(isVisible(view))
    .where('release.economy_code', '=', which.economy)
    .where('release.period', '=', which.period)
    .orderBy('release.revision')
    .execute();
}

/** A value of a period as revision 1 of the period's own release had it, in log points. */
export interface FirstPublished {
  period: string;
  value: number | null;
  lower: number | null;
  upper: number | null;
  releaseId: string;
  publishedAt: Date;
}

/**
 * An indicator as first published, oldest first, from `from` to `to`, both included. Periods before the first
 * release are not in the list.
 */
export async function firstPublished(
  db: Db,
  view: View,
  which: { economy: string; indicator: string; from?: string; to?: string },
): Promise<FirstPublished[]> {
  let query = db
    .selectFrom('release')
    .innerJoin('release_value', (join) =>
      join
        .onRef('release_value.release_id', '=', 'release.id')
        .onRef('release_value.period', '=', 'release.period'),
    )
    .select([
      'release.period',
      'release_value.value',
      'release_value.lower',
      'release_value.upper',
      'release.id as releaseId',
      publishedAt(view).as('publishedAt'),
    ])
    .where(isVisible(view))
    .where('release.economy_code', '=', which.economy)
    .where('release.revision', '=', 1)
    .where('release_value.indicator', '=', which.indicator)
    .orderBy('release.period');
  if (which.from) query = query.where('release.period', '>=', which.from);
  if (which.to) query = query.where('release.period', '<=', which.to);
  return query.execute();
}
