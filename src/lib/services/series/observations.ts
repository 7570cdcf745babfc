import type { Db } from '../../../../db/connection.ts';
import { periodDifference, periodsFrom } from '../../econ/periods.ts';
import { firstPublished } from '../releases/public.ts';
import { isVisible, publishedAt } from '../releases/visible.ts';
import type { View } from '../view.ts';
import type { DerivedConcept } from './concepts.ts';
import { servedVintages } from './extents.ts';
import type { SeriesInfo } from './list.ts';

/**
 * `normal`; `assumption` where the model's own test is rejected, so that the figure is assumed and not estimated;
 * `missing` where there is no value.
 */
export type ObservationStatus = 'normal' | 'assumption' | 'missing';

/** One value of a series, in its unit, as a release published it. */
export interface Observation {
  period: string;
  value: number | null;
  /** The digits of the desk's file, for input series; a derived value has none but its own. */
  digits: string | null;
  status: ObservationStatus;
  releaseId: string;
  publishedAt: Date;
}

/** First and last period wanted, both included, in the form of the series' frequency. */
export interface Span {
  from?: string;
  to?: string;
}

/**
 * What a view shows of a series, oldest first: an input's public vintage as far as it is released; of a derived one the latest
 * release's history, or each period as first published. Empty where its values are not served.
 */
export async function observations(
  db: Db,
  view: View,
  series: SeriesInfo,
  span: Span = {},
): Promise<Observation[]> {
  const { origin } = series;
  if (origin.kind === 'input') {
    return origin.servesValues ? inputValues(db, view, series, span) : [];
  }
  return origin.derived.history === 'first'
    ? firstValues(db, view, series, origin.derived, span)
    : latestValues(db, view, series, origin.derived, span);
}

async function inputValues(
  db: Db,
  view: View,
  series: SeriesInfo,
  { from, to }: Span,
): Promise<Observation[]> {
  const vintage = (await servedVintages(db, view, [series.economyCode])).get(series.id);
  if (!vintage) return [];
  const row = await db
    .selectFrom('vintage_series')
    .select(['start', 'values'])
    .where('vintage_id', '=', vintage.vintageId)
    .where('series_id', '=', series.id)
    .executeTakeFirstOrThrow();
  const count = periodDifference(row.start, vintage.lastPeriod) + 1;
  return periodsFrom(row.start, count, series.frequency)
    .map((period, i): Observation => {
      const digits = row.values[i]!;
      const { releaseId, lastUpdated } = vintage;
      return {
        period,
        value: Number(digits),
        digits,
        status: 'normal',
        releaseId,
        publishedAt: lastUpdated,
      };
    })
    .filter(({ period }) => (!from || period >= from) && (!to || period <= to));
}

async function latestValues(
  db: Db,
  view: View,
  series: SeriesInfo,
  derived: DerivedConcept,
  { from, to }: Span,
): Promise<Observation[]> {
  if (!series.releaseId) return [];
  let query = db
    .selectFrom('release_value')
    .innerJoin('release', 'release.id', 'release_value.release_id')
    .select([
      'release_value.period',
      'release_value.value',
      'release_value.lower',
      'release_value.upper',
      'release.id as releaseId',
      publishedAt(view).as('publishedAt'),
    ])
    .where('release_value.release_id', '=', series.releaseId)
    .where('release_value.indicator', '=', derived.indicator)
    .where(isVisible(view))
    .orderBy('release_value.period');
  if (from) query = query.where('release_value.period', '>=', from);
  if (to) query = query.where('release_value.period', '<=', to);
  return (await query.execute()).map((row) => observed(row, derived));
}

async function firstValues(
  db: Db,
  view: View,
  series: SeriesInfo,
  derived: DerivedConcept,
  { from, to }: Span,
): Promise<Observation[]> {
  const rows = await firstPublished(db, view, {
    economy: series.economyCode,
    indicator: derived.indicator,
    from,
    to,
  });
  return rows.map((row) => observed(row, derived));
}

interface ValueRow {
  period: string;
  value: number | null;
  lower: number | null;
  upper: number | null;
  releaseId: string;
  publishedAt: Date;
}

/** Concepts whose values the model's own test can turn into assumptions. */
const GATED = ['implied_gap', 'output_effect'];

function observed(row: ValueRow, { indicator, column }: DerivedConcept): Observation {
  const { period, releaseId, publishedAt: at } = row;
  // A gap always has its band but where the test rejects the model (valuesOf).
  const isAssumption = GATED.includes(indicator) && row.value !== null && row.lower === null;
  const value = row[column];
  const status = isAssumption ? 'assumption' : value === null ? 'missing' : 'normal';
  return { period, value, digits: null, status, releaseId, publishedAt: at };
}
