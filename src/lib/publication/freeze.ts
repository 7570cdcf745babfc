import type { ComputeRequest, ComputeResult } from '../econ/types.ts';
import { buildId, methodVersion } from '../build.ts';
import type { InTransaction, ServiceContext } from '../services/context.ts';
import { ServiceError } from '../services/context.ts';
import { type ReleaseValue, valuesOf } from '../services/series/concepts.ts';
import { figuresFile } from '../services/series/figuresFile.ts';
import { type Kept, keep, recordArtefacts } from './artefacts.ts';

/** Everything of a release that is fixed at approval: drawn and stored, waiting for the transaction that keeps it. */
export interface Frozen {
  releaseId: string;
  /** The release's `version` that was drawn: where it has moved on, nothing may be kept. */
  version: number;
  files: { name: string; kept: Kept }[];
  values: ReleaseValue[];
}

/** Draws a release's images and writes its data files into the store. Nothing counts before `keepFrozen`. */
export async function prepareFreeze(ctx: ServiceContext, releaseId: string): Promise<Frozen> {
  const release = await ctx.db
    .selectFrom('release')
    .innerJoin('economy', 'economy.code', 'release.economy_code')
    .innerJoin('series', (join) =>
      join.onRef('series.economy_code', '=', 'economy.code').on('series.concept', '=', 'money'),
    )
    .select([
      'release.period',
      'release.headline',
      'release.version',
      'release.request',
      'release.result',
      'economy.name',
      'series.source',
    ])
    .where('release.id', '=', releaseId)
    .executeTakeFirst();
  if (!release) throw new ServiceError('not_found', `There is no release ${releaseId}.`);
  const request = release.request as ComputeRequest | null;
  const result = release.result as ComputeResult | null;
  const i = result?.periods.indexOf(release.period) ?? -1;
  if (!request || !result || i < 0) {
    throw new ServiceError(
      'invalid',
      `${releaseId} has no computed figure for ${release.period}; compute it before approving.`,
    );
  }
  const image = await ctx.workers.shareImage({
    economy: release.name,
    period: release.period,
    title: release.headline,
    surprise: result.surprise[i]!,
    growth: result.growth[i]!,
    expected: result.expected_growth[i]!,
    forecast_se: result.forecast_se[i] ?? null,
    history: {
      periods: result.periods.slice(0, i + 1),
      surprise: result.surprise.slice(0, i + 1),
      forecast_se: result.forecast_se.slice(0, i + 1),
    },
    source: release.source,
    methodVersion,
  });
  const values = valuesOf(result, request);
  const json = (value: unknown) => text(`${JSON.stringify(value)}\n`);
  const files: [string, Uint8Array, string][] = [
    ['surprise-wide.svg', text(image.svg), 'image/svg+xml'],
    ['surprise-wide.png', image.png, 'image/png'],
    ['request.json', json(request), 'application/json'],
    ['result.json', json(result), 'application/json'],
    ['figures.csv', text(figuresFile(values)), 'text/csv; charset=utf-8'],
  ];
  return {
    releaseId,
    version: release.version,
    values,
    files: await Promise.all(
      files.map(async ([name, bytes, mediaType]) => ({
        name,
        kept: await keep(ctx, bytes, mediaType),
      })),
    ),
  };
}

/**
 * Makes what was frozen part of the release, in the transaction that approves it. Throws a conflict where the
 * release was changed after it was drawn.
 */
export async function keepFrozen(ctx: InTransaction, frozen: Frozen): Promise<void> {
  const { releaseId, version, files, values } = frozen;
  const at = ctx.now();
  const kept = await ctx.db
    .updateTable('release')
    .set({ method_version: methodVersion, build: buildId })
    .where('id', '=', releaseId)
    .where('version', '=', version)
    .executeTakeFirst();
  if (kept.numUpdatedRows === 0n) {
    throw new ServiceError(
      'conflict',
      `${releaseId} was changed while it was being approved; look at it again.`,
    );
  }
  // An earlier approval that was taken back has left its own; it was never public.
  await ctx.db.deleteFrom('release_value').where('release_id', '=', releaseId).execute();
  await ctx.db.deleteFrom('release_artefact').where('release_id', '=', releaseId).execute();
  await recordArtefacts(
    ctx.db,
    files.map((file) => file.kept),
    at,
  );
  await ctx.db
    .insertInto('release_artefact')
    .values(
      files.map((file) => ({
        release_id: releaseId,
        name: file.name,
        artefact_hash: file.kept.hash,
      })),
    )
    .execute();
  // PostgreSQL takes 65,535 parameters a statement; a value has six.
  for (let from = 0; from < values.length; from += 5_000) {
    await ctx.db
      .insertInto('release_value')
      .values(
        values.slice(from, from + 5_000).map((value) => ({ release_id: releaseId, ...value })),
      )
      .execute();
  }
}

function text(content: string): Uint8Array {
  return new TextEncoder().encode(content);
}
