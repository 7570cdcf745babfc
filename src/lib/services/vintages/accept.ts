import { z } from 'zod';
import { record } from '../audit.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { lockedEconomy } from '../economies/locked.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { refuseLarge } from './decode.ts';
import { FaultList } from './faults.ts';
import { type FileSeries, parseVintage } from './parse.ts';

const fields = z.object({
  economy: z.string(),
  fileName: z.string().trim().min(1).max(255).catch('data.csv'),
  sourcePublishedAt: z.date('Enter when the source published these figures, in UTC.'),
  note: z.string().trim().max(2000, 'Use at most 2,000 characters.').default(''),
});

export interface NewVintage {
  economy: string;
  fileName: string;
  bytes: Uint8Array;
  /** When the source published these figures; orders vintages that are loaded late. */
  sourcePublishedAt: Date;
  note?: string;
}

/**
 * Accepts a data file as a vintage: the file is kept under its hash, each series in the digits of the file.
 * Nothing is stored where anything is wrong.
 * @throws VintageFileError with every fault of the file
 */
export async function acceptVintage(
  ctx: ServiceContext,
  input: NewVintage,
): Promise<{ id: string; series: FileSeries[] }> {
  const actor = requirePermission(ctx.actor, 'vintages.load');
  refuseLarge(input.bytes.length);
  const about = parseInput(fields, input);
  if (about.sourcePublishedAt > ctx.now()) {
    throw new ServiceError('invalid', 'Some fields need another look.', [
      {
        field: 'sourcePublishedAt',
        message: 'Enter a time that has passed: the source cannot have published later than now.',
      },
    ]);
  }
  return transact(ctx, async (trx) => {
    const economy = await lockedEconomy(trx, about.economy);
    const series = parseVintage(input.bytes, economy.frequency);
    const ids = await seriesIds(trx, economy.code, economy.name, series);
    const hash = await ctx.store.put(input.bytes);
    await refuseTwice(trx, economy.code, hash, about.sourcePublishedAt);
    const at = trx.now();
    await trx.db
      .insertInto('artefact')
      .values({ hash, media_type: 'text/csv', size: input.bytes.length, created_at: at })
      .onConflict((conflict) => conflict.doNothing())
      .execute();
    const { id } = await trx.db
      .insertInto('vintage')
      .values({
        economy_code: economy.code,
        file_name: about.fileName,
        file_hash: hash,
        file_size: input.bytes.length,
        note: about.note,
        source_published_at: about.sourcePublishedAt,
        known_from: at,
        public_from: null,
        loaded_by: actor.id,
      })
      .returning('id')
      .executeTakeFirstOrThrow();
    await trx.db
      .insertInto('vintage_series')
      .values(
        series.map(({ concept, start, values }) => ({
          vintage_id: id,
          series_id: ids.get(concept) as string,
          start,
          values,
        })),
      )
      .execute();
    await record(trx, {
      action: 'vintage.accepted',
      subject: `vintage ${id}`,
      detail: {
        economy: economy.code,
        fileName: about.fileName,
        sourcePublishedAt: about.sourcePublishedAt,
        series: series.map(({ concept, start, values }) => ({
          concept,
          start,
          periods: values.length,
        })),
      },
    });
    return { id, series };
  });
}

/** The ids of the file's series. @throws VintageFileError naming a column the economy has no series for. */
async function seriesIds(
  ctx: InTransaction,
  code: string,
  name: string,
  series: FileSeries[],
): Promise<Map<string, string>> {
  const rows = await ctx.db
    .selectFrom('series')
    .select(['id', 'concept'])
    .where('economy_code', '=', code)
    .execute();
  const ids = new Map(rows.map((row) => [row.concept as string, row.id]));
  const faults = new FaultList();
  for (const { concept } of series) {
    if (ids.has(concept)) continue;
    const has = [...ids.keys()].join(', ');
    faults.add(1, concept, `a column ${concept}`, `only what ${name} has: ${has}`);
  }
  faults.refuseAny();
  return ids;
}

/** A form sent twice is one vintage. */
async function refuseTwice(
  ctx: InTransaction,
  economy: string,
  hash: string,
  sourcePublishedAt: Date,
): Promise<void> {
  const same = await ctx.db
    .selectFrom('vintage')
    .select('id')
    .where('economy_code', '=', economy)
    .where('file_hash', '=', hash)
    .where('source_published_at', '=', sourcePublishedAt)
    .executeTakeFirst();
  if (!same) return;
  throw new ServiceError(
    'conflict',
    `This file is loaded already, with the same source time, as vintage ${same.id}.`,
  );
}
