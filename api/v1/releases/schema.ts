import { z } from '@hono/zod-openapi';
import type { PublicRelease, ReleaseSummary } from '../../../src/lib/services/releases/public.ts';
import { DATA_CAUTION } from '../../../src/lib/services/series/cautions.ts';
import { valuesOf } from '../../../src/lib/services/series/concepts.ts';
import { frequencySchema, periodSchema, timeSchema } from '../../responses.ts';

export const releaseSummarySchema = z
  .object({
    id: z.string().openapi({ example: 'XAL-2031-08-r1' }),
    economy: z.string(),
    frequency: frequencySchema,
    period: periodSchema,
    revision: z.int(),
    state: z
      .enum(['published', 'corrected'])
      .openapi({ description: '`corrected`: a newer revision has taken its place.' }),
    headline: z.string(),
    published_at: timeSchema,
    page: z.string().openapi({ description: 'Where people read it.' }),
  })
  .openapi('ReleaseSummary');

export const releaseSchema = releaseSummarySchema
  .extend({
    explainer: z.string().openapi({ description: 'Markdown.' }),
    figures: z
      .array(
        z.object({
          indicator: z.string(),
          value: z.number().nullable(),
          lower: z.number().nullable(),
          upper: z.number().nullable(),
        }),
      )
      .openapi({ description: "The reference period's own figures, in log points." }),
    warnings: z.array(z.string()),
    specification: z.object({
      version: z.int(),
      assumptions: z.looseObject({}),
      reason: z.string(),
      holds_from: z.string(),
    }),
    method_version: z.string(),
    source_published_at: timeSchema,
    contact: z.string(),
    caution: z.string(),
  })
  .openapi('Release');

/** A release in a list. */
export function presentSummary(
  release: ReleaseSummary,
  { publicUrl, isNewest }: { publicUrl: string; isNewest: boolean },
): z.infer<typeof releaseSummarySchema> {
  const { economyCode, period, revision } = release;
  return {
    id: release.id,
    economy: economyCode,
    frequency: release.frequency,
    period,
    revision,
    state: isNewest ? 'published' : 'corrected',
    headline: release.headline,
    published_at: release.publishedAt.toISOString(),
    page: `${publicUrl}/releases/${economyCode}/${period}/r${revision}/`,
  };
}

/** A release with what was frozen with it. */
export function presentRelease(
  release: PublicRelease,
  options: { publicUrl: string; isNewest: boolean },
): z.infer<typeof releaseSchema> {
  const { specification, result, request } = release;
  return {
    ...presentSummary(release, options),
    explainer: release.explainer,
    figures: valuesOf(result, request)
      .filter(({ period }) => period === release.period)
      .map(({ indicator, value, lower, upper }) => ({ indicator, value, lower, upper })),
    warnings: result.warnings,
    specification: {
      version: specification.version,
      assumptions: { ...specification.assumptions },
      reason: specification.reason,
      holds_from: specification.holdsFrom,
    },
    method_version: release.methodVersion,
    source_published_at: release.vintage.sourcePublishedAt.toISOString(),
    contact: release.contact,
    caution: DATA_CAUTION,
  };
}
