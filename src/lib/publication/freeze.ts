import type { ReleasedFigure } from '../econ/facts.ts';
import type { ComputeRequest, ComputeResult } from '../econ/types.ts';
import { buildId, methodVersion } from '../build.ts';
import type { InTransaction, ServiceContext } from '../services/context.ts';
import { ServiceError } from '../services/context.ts';
import { firstPublished } from '../services/releases/public.ts';
import { type ReleaseValue, valuesOf } from '../services/series/concepts.ts';
import { figuresFile, inputsFile } from '../services/series/figuresFile.ts';
import { bundleOf } from './bundle.ts';
import { releasePages } from './plan.ts';
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
      'release.economy_code',
      'release.revision',
      'release.headline',
      'release.explainer',
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
  await refuseUndrawable(ctx, release, releaseId);
  const { facts, race } = await ctx.workers.examine(
    request,
    result,
    await releasedFigures(ctx, release.economy_code),
  );
  const values = valuesOf(result, request);
  const json = (value: unknown) => text(`${JSON.stringify(value)}\n`);
  const files: FileToKeep[] = [
    { name: 'surprise-wide.svg', bytes: text(image.svg), mediaType: 'image/svg+xml' },
    { name: 'surprise-wide.png', bytes: image.png, mediaType: 'image/png' },
    { name: 'request.json', bytes: json(request), mediaType: 'application/json' },
    { name: 'result.json', bytes: json(result), mediaType: 'application/json' },
    {
      name: 'inputs.csv',
      bytes: text(inputsFile(request)),
      mediaType: 'text/csv; charset=utf-8',
    },
    { name: 'facts.json', bytes: json(facts), mediaType: 'application/json' },
    { name: 'race.json', bytes: json(race), mediaType: 'application/json' },
    { name: 'figures.csv', bytes: text(figuresFile(values)), mediaType: 'text/csv; charset=utf-8' },
    {
      name: 'explainer.md',
      bytes: text(`# ${release.headline}\n\n${release.explainer}\n`),
      mediaType: 'text/markdown; charset=utf-8',
    },
  ];
  files.push({ name: 'bundle.zip', bytes: bundleOf(files), mediaType: 'application/zip' });
  return {
    releaseId,
    version: release.version,
    values,
    files: await Promise.all(
      files.map(async ({ name, bytes, mediaType }) => ({
        name,
        kept: await keep(ctx, bytes, mediaType),
      })),
    ),
  };
}

/** A page that cannot be drawn would hold up every release after it: so it is drawn once before anything is frozen. */
async function refuseUndrawable(
  ctx: ServiceContext,
  release: { economy_code: string; period: string; revision: number },
  id: string,
): Promise<void> {
  const address = releasePages({ ...release, economyCode: release.economy_code })[1]!;
  const drawn = await ctx.workers.page(address, { at: ctx.now(), include: id }).catch(() => null);
  if (drawn?.status === 200) return;
  throw new ServiceError(
    'invalid',
    `The page of ${id} cannot be drawn from its words and figures; send it back to be mended.`,
  );
}

interface FileToKeep {
  name: string;
  bytes: Uint8Array;
  mediaType: string;
}

/** What earlier releases of the economy said of their own periods, for the facts on what was revised. */
async function releasedFigures(ctx: ServiceContext, economy: string): Promise<ReleasedFigure[]> {
  const view = { at: ctx.now() };
  const [surprises, gaps] = await Promise.all(
    ['money_surprise', 'implied_gap'].map((indicator) =>
      firstPublished(ctx.db, view, { economy, indicator }),
    ),
  );
  const gapOf = new Map(gaps!.map(({ period, value }) => [period, value]));
  return surprises!.map(({ period, value }) => ({
    period,
    surprise: value,
    gap: gapOf.get(period) ?? null,
  }));
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
