import type { Transaction } from 'kysely';
import type { Database } from '../../../db/tables.ts';
import type { ServiceContext } from '../services/context.ts';

/** Bytes that are in the store and wait for the transaction that makes them count. */
export interface Kept {
  hash: string;
  mediaType: string;
  size: number;
}

const COMPRESSIBLE = /^(text\/|application\/(json|xml|.*\+(json|xml))|image\/svg\+xml)/;

/** Puts bytes into the store, with their compressed forms where that saves anything. */
export async function keep(
  ctx: Pick<ServiceContext, 'store' | 'workers'>,
  bytes: Uint8Array,
  mediaType: string,
): Promise<Kept> {
  const hash = await ctx.store.put(bytes);
  if (COMPRESSIBLE.test(mediaType) && !(await ctx.store.get(hash, 'gzip'))) {
    const { br, gzip } = await ctx.workers.compress(bytes);
    await ctx.store.putEncoded(hash, 'br', br);
    await ctx.store.putEncoded(hash, 'gzip', gzip);
  }
  return { hash, mediaType, size: bytes.byteLength };
}

/** Records kept bytes; the same bytes twice are one row. */
export async function recordArtefacts(
  trx: Transaction<Database>,
  kept: Kept[],
  at: Date,
): Promise<void> {
  const unique = [...new Map(kept.map((one) => [one.hash, one])).values()];
  if (unique.length === 0) return;
  await trx
    .insertInto('artefact')
    .values(
      unique.map((one) => ({
        hash: one.hash,
        media_type: one.mediaType,
        size: one.size,
        created_at: at,
      })),
    )
    .onConflict((conflict) => conflict.column('hash').doNothing())
    .execute();
}
