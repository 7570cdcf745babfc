import { z } from '@hono/zod-openapi';
import { DATA_CAUTION } from '../../../src/lib/services/series/cautions.ts';
import type { SeriesInfo } from '../../../src/lib/services/series/list.ts';
import type { Observation } from '../../../src/lib/services/series/observations.ts';
import { frequencySchema, periodSchema, timeSchema } from '../../responses.ts';

export const seriesIdParam = z.object({
  id: z.string().openapi({ example: 'XAL.money_surprise.M' }),
});

export const seriesSchema = z
  .object({
    id: z.string().openapi({ example: 'XAL.money_surprise.M' }),
    economy: z.string(),
    concept: z.string(),
    title: z.string(),
    unit: z.string(),
    frequency: frequencySchema,
    adjustment: z
      .enum(['adjusted', 'unadjusted'])
      .openapi({ description: 'Seasonal adjustment of the data behind it.' }),
    timing: z
      .enum(['end', 'average'])
      .nullable()
      .openapi({ description: 'Whether the data stand for the end of a period or its average.' }),
    source: z.string(),
    licence: z.string(),
    serves_values: z.boolean().openapi({
      description: "False where the source's licence keeps the values from being passed on.",
    }),
    first_period: periodSchema.nullable(),
    last_period: periodSchema.nullable(),
    last_updated: timeSchema.nullable(),
    release: z
      .string()
      .nullable()
      .openapi({ description: 'The release its newest values came with.' }),
    caution: z.string(),
    citation: z.string(),
  })
  .openapi('Series');

export const observationSchema = z
  .object({
    series: z.string(),
    period: periodSchema,
    value: z.number().nullable(),
    status: z.enum(['normal', 'assumption', 'missing']).openapi({
      description:
        "`assumption`: the model's own test is rejected, so the figure is assumed, not estimated.",
    }),
    release: z.string(),
    published_at: timeSchema,
  })
  .openapi('Observation');

/** A series as the API tells of it. */
export function presentSeries(series: SeriesInfo, publicUrl: string): z.infer<typeof seriesSchema> {
  const { origin } = series;
  return {
    id: series.id,
    economy: series.economyCode,
    concept: series.concept,
    title: series.title,
    unit: series.unit,
    frequency: series.frequency,
    adjustment: series.adjustment,
    timing: series.timing,
    source: series.source,
    licence: series.licence,
    serves_values: origin.kind === 'derived' || origin.servesValues,
    first_period: series.firstPeriod,
    last_period: series.lastPeriod,
    last_updated: series.lastUpdated?.toISOString() ?? null,
    release: series.releaseId,
    caution: DATA_CAUTION,
    citation: citationOf(series, publicUrl),
  };
}

/** One value as the API tells of it; the columns of the long CSV. */
export function presentObservation(
  id: string,
  row: Observation,
): z.infer<typeof observationSchema> {
  return {
    series: id,
    period: row.period,
    value: row.value,
    status: row.status,
    release: row.releaseId,
    published_at: row.publishedAt.toISOString(),
  };
}

function citationOf(series: SeriesInfo, publicUrl: string): string {
  const { economyName, title, id, releaseId, lastUpdated, economyCode } = series;
  const release =
    releaseId && lastUpdated
      ? `, release ${releaseId} of ${lastUpdated.toISOString().slice(0, 10)}`
      : '';
  return `Slackwater: ${title}, ${economyName} (${id})${release}. ${publicUrl}/economies/${economyCode}/`;
}
