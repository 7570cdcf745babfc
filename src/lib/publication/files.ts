import type { ServiceContext } from '../services/context.ts';
import { latestRelease } from '../services/releases/public.ts';
import type { View } from '../services/view.ts';
import type { Kept } from './artefacts.ts';
import { type Planned, imageAddresses, releaseFile } from './plan.ts';

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
  const frozen = await ctx.db
    .selectFrom('release_artefact')
    .innerJoin('artefact', 'artefact.hash', 'release_artefact.artefact_hash')
    .select(['release_artefact.name', 'artefact.hash', 'artefact.media_type', 'artefact.size'])
    .where('release_artefact.release_id', '=', release.id)
    .execute();
  const newest = await latestRelease(ctx.db, view, release.economyCode);
  const isNewest = newest === null || newest.id === release.id;
  return frozen.flatMap(({ name, hash, media_type, size }) => {
    const kept = { hash, mediaType: media_type, size: Number(size) };
    const addresses = media_type.startsWith('image/')
      ? imageAddresses(release, name, isNewest)
      : [releaseFile(release.id, name)];
    return addresses.map((address) => ({ address, kept }));
  });
}
