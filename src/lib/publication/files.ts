import type { ServiceContext } from '../services/context.ts';
import { latestRelease } from '../services/releases/public.ts';
import { csvOf } from '../services/series/csv.ts';
import { mayServeInputs } from '../services/series/mayServeInputs.ts';
import { listSeries } from '../services/series/list.ts';
import { observations } from '../services/series/observations.ts';
import type { View } from '../services/view.ts';
import { type Kept, keep } from './artefacts.ts';
import { type Planned, imageAddresses, releaseFile, seriesFile } from './plan.ts';

/** Files of a release that hold its input values: public only where every licence lets us serve them. */
const WITH_INPUTS = new Set(['request.json', 'inputs.csv', 'bundle.zip']);

/** A file and one of the addresses it is reached at. */
export interface PlacedFile {
  address: string;
  kept: Kept;
}

/** All files that a release brings or changes at its moment. */
export async function filesOf(
  ctx: ServiceContext,
  view: View,
  release: Planned & { id: string },
): Promise<PlacedFile[]> {
  return [
    ...(await frozenFiles(ctx, view, release)),
    ...(await seriesFiles(ctx, view, release.economyCode)),
  ];
}

async function frozenFiles(
  ctx: ServiceContext,
  view: View,
  release: Planned & { id: string },
): Promise<PlacedFile[]> {
  const frozen = await ctx.db
    .selectFrom('release_artefact')
    .innerJoin('artefact', 'artefact.hash', 'release_artefact.artefact_hash')
    .select(['release_artefact.name', 'artefact.hash', 'artefact.media_type', 'artefact.size'])
    .where('release_artefact.release_id', '=', release.id)
    .execute();
  const newest = await latestRelease(ctx.db, view, release.economyCode);
  const isNewest = newest === null || newest.id === release.id;
  const servesInputs = await mayServeInputs(ctx.db, release.economyCode);
  return frozen.flatMap(({ name, hash, media_type, size }) => {
    if (WITH_INPUTS.has(name) && !servesInputs) return [];
    const kept = { hash, mediaType: media_type, size: Number(size) };
    const addresses = media_type.startsWith('image/')
      ? imageAddresses(release, name, isNewest)
      : [releaseFile(release.id, name)];
    return addresses.map((address) => ({ address, kept }));
  });
}

/** The stable files of an economy's series, as they stand in the view; none for values we may not serve. */
async function seriesFiles(
  ctx: ServiceContext,
  view: View,
  economy: string,
): Promise<PlacedFile[]> {
  const all = await listSeries(ctx.db, view, { economy });
  const placed = await Promise.all(
    all.map(async (series) => {
      const values = await observations(ctx.db, view, series);
      if (values.length === 0) return null;
      const bytes = new TextEncoder().encode(csvOf(series, values));
      const kept = await keep(ctx, bytes, 'text/csv; charset=utf-8');
      return { address: seriesFile(series.id), kept };
    }),
  );
  return placed.filter((file) => file !== null);
}
