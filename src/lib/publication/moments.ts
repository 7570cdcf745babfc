import { type Transaction, sql } from 'kysely';
import type { Db } from '../../../db/connection.ts';
import { nextGeneration } from '../../../db/queries/published.ts';
import type { Database } from '../../../db/tables.ts';
import type { InTransaction, ServiceContext } from '../services/context.ts';
import { recordArtefacts } from './artefacts.ts';
import {
  type Coming,
  IMMEDIATE_MS,
  type Row,
  changes,
  drawImmediate,
  drawMoment,
  drawPage,
} from './draw.ts';
import { exclusively } from './lock.ts';

interface Moment {
  at: Date;
  releases: Coming[];
  rows: Row[];
}

/**
 * Draws what has changed: what counts at once (announced dates, a new economy) and every coming moment in order,
 * each on top of the one before, and puts all of it in force in one transaction. Where a moment cannot be drawn,
 * those before it count all the same, and it throws; the next call, from whichever process, finds the same work.
 */
export async function bringUpToDate(ctx: ServiceContext): Promise<void> {
  await exclusively(ctx.db, async () => {
    for (;;) {
      const { moments, failure } = await drawAll(ctx);
      if (!(await putInForce(ctx, moments))) continue;
      if (failure) throw failure.error;
      return;
    }
  });
}

async function drawAll(
  ctx: ServiceContext,
): Promise<{ moments: Moment[]; failure: { error: unknown } | null }> {
  const coming = await comingReleases(ctx.db, ctx.now());
  const moments: Moment[] = [];
  let failure: { error: unknown } | null = null;
  for (const releases of groupBySecond(coming)) {
    const at = releases[0]!.at;
    try {
      moments.push({ at, releases, rows: await drawMoment(ctx, at, releases) });
    } catch (error) {
      failure = { error };
      break;
    }
  }
  const immediate = await drawImmediate(ctx);
  const effective = new Date(ctx.now().getTime() + IMMEDIATE_MS);
  // A moment within the next seconds is drawn with the same announcements: it needs no change before it.
  const isCovered = moments.some((moment) => moment.at <= effective);
  if (immediate.length > 0 && !isCovered) {
    moments.unshift({ at: effective, releases: [], rows: immediate });
  }
  return { moments, failure };
}

/**
 * Whether anything waits to be drawn: a scheduled release, a changed date or specification, or the very first pages.
 * A process died, or drawing failed.
 */
export async function isBehind(db: Db, at: Date): Promise<boolean> {
  const waiting = await db
    .selectFrom('release')
    .select('id')
    .where('state', '=', 'scheduled')
    .where('scheduled_for', '>', at)
    .where((eb) => eb('ready_for', 'is distinct from', eb.ref('scheduled_for')))
    .limit(1)
    .executeTakeFirst();
  return waiting !== undefined || (await changes(db, at)) !== null;
}

/** Scheduled releases whose second has passed without their pages: they show nowhere, and need another time. */
export async function lateReleases(db: Db, at: Date): Promise<string[]> {
  const rows = await db
    .selectFrom('release')
    .select('id')
    .where('state', '=', 'scheduled')
    .where('scheduled_for', '<=', at)
    .where((eb) => eb('ready_for', 'is distinct from', eb.ref('scheduled_for')))
    .execute();
  return rows.map((row) => row.id);
}

/**
 * Takes a coming moment out, in the transaction that unschedules its release: its rows go, and the later moments,
 * drawn on top of it, do not count until they are drawn again (`bringUpToDate`). A second that has passed stays as
 * it was: a release that missed it is in nothing that was drawn.
 */
export async function takeOut(ctx: InTransaction, at: Date): Promise<void> {
  if (at <= ctx.now()) return;
  await ctx.db.deleteFrom('moment').where('visible_from', '=', at).execute();
  await ctx.db.updateTable('moment').set({ ready: false }).where('visible_from', '>', at).execute();
  await ctx.db
    .updateTable('release')
    .set({ ready_for: null })
    .where('state', '=', 'scheduled')
    .where('ready_for', '>=', at)
    .execute();
  await resetPublicFrom(ctx.db, at);
  await nextGeneration(ctx.db);
}

/**
 * Draws the pages again that another build, or another public address, has drawn: all that are in force or coming.
 * Frozen images and files stay as they are. Answers how many it drew.
 */
export async function redraw(
  ctx: ServiceContext,
  onPage?: (done: number, all: number) => void,
): Promise<number> {
  return exclusively(ctx.db, async () => {
    const now = ctx.now();
    const stale = await ctx.db
      .selectFrom('published')
      .select(['address', 'visible_from'])
      .where('build', 'is not', null)
      .where('build', '<>', ctx.build)
      .where((eb) =>
        eb.not(
          eb.exists(
            eb
              .selectFrom('published as later')
              .select('later.address')
              .whereRef('later.address', '=', 'published.address')
              .whereRef('later.visible_from', '>', 'published.visible_from')
              .where('later.visible_from', '<=', now),
          ),
        ),
      )
      .execute();
    const drawn: { at: Date; row: Row }[] = [];
    for (const { address, visible_from } of stale) {
      const row = await drawPage(ctx, address, {
        at: visible_from,
        ...(visible_from > now ? { rehearsedAt: now } : {}),
      });
      drawn.push({ at: visible_from, row });
      onPage?.(drawn.length, stale.length);
    }
    if (drawn.length === 0) return 0;
    await ctx.db.transaction().execute(async (trx) => {
      await recordArtefacts(
        trx,
        drawn.map(({ row }) => row.kept),
        now,
      );
      const generation = await nextGeneration(trx);
      for (const { at, row } of drawn) await insertRows(trx, at, [row], ctx.build, generation);
    });
    return drawn.length;
  });
}

async function comingReleases(db: Db, now: Date): Promise<Coming[]> {
  const rows = await db
    .selectFrom('release')
    .select(['id', 'economy_code', 'period', 'revision', 'scheduled_for', 'vintage_id'])
    .where('state', '=', 'scheduled')
    .where('scheduled_for', '>', now)
    .orderBy('scheduled_for')
    .orderBy('id')
    .execute();
  return rows.map((row) => ({
    id: row.id,
    economyCode: row.economy_code,
    period: row.period,
    revision: row.revision,
    at: row.scheduled_for!,
    vintageId: row.vintage_id,
  }));
}

function groupBySecond(coming: Coming[]): Coming[][] {
  const groups = new Map<number, Coming[]>();
  for (const release of coming) {
    const time = release.at.getTime();
    groups.set(time, [...(groups.get(time) ?? []), release]);
  }
  return [...groups.values()];
}

/**
 * Puts drawn moments in force. Answers false, with nothing changed, where one's second has passed meanwhile: it stays
 * out, and what was drawn on top of it has to be drawn without it.
 */
async function putInForce(ctx: ServiceContext, moments: Moment[]): Promise<boolean> {
  const now = ctx.now();
  if (moments.some((moment) => moment.at <= now)) return false;
  if (moments.length === 0) return true;
  await ctx.db.transaction().execute(async (trx) => {
    const generation = await nextGeneration(trx);
    await recordArtefacts(
      trx,
      moments.flatMap((moment) => moment.rows.map((row) => row.kept)),
      now,
    );
    for (const moment of moments) {
      await trx.deleteFrom('published').where('visible_from', '=', moment.at).execute();
      await trx
        .insertInto('moment')
        .values({ visible_from: moment.at, ready: true, rendered_at: now })
        .onConflict((conflict) =>
          conflict.column('visible_from').doUpdateSet({ ready: true, rendered_at: now }),
        )
        .execute();
      await insertRows(trx, moment.at, moment.rows, ctx.build, generation);
      for (const release of moment.releases) {
        const readied = await trx
          .updateTable('release')
          .set({ ready_for: moment.at })
          .where('id', '=', release.id)
          .where('state', '=', 'scheduled')
          .where('scheduled_for', '=', moment.at)
          .executeTakeFirst();
        if (readied.numUpdatedRows === 0n) {
          throw new Error(`${release.id} was taken off the schedule while it was drawn`);
        }
        await trx
          .updateTable('vintage')
          .set({ public_from: sql`least(public_from, ${moment.at})` })
          .where('id', '=', release.vintageId)
          .execute();
      }
    }
  });
  return true;
}

async function insertRows(
  trx: Transaction<Database>,
  at: Date,
  rows: Row[],
  build: string,
  generation: string,
): Promise<void> {
  if (rows.length === 0) return;
  await trx
    .insertInto('published')
    .values(
      rows.map((row) => ({
        address: row.address,
        visible_from: at,
        artefact_hash: row.kept.hash,
        status: row.status,
        headers: JSON.stringify(row.headers),
        drawn_at: row.drawnAt,
        build: row.isPage ? build : null,
        generation,
      })),
    )
    .onConflict((conflict) =>
      conflict.columns(['address', 'visible_from']).doUpdateSet((eb) => ({
        artefact_hash: eb.ref('excluded.artefact_hash'),
        status: eb.ref('excluded.status'),
        headers: eb.ref('excluded.headers'),
        drawn_at: eb.ref('excluded.drawn_at'),
        build: eb.ref('excluded.build'),
        generation: eb.ref('excluded.generation'),
      })),
    )
    .execute();
}

/** A vintage becomes public with the first release that freezes it; the one just taken out may have been that. */
async function resetPublicFrom(trx: Transaction<Database>, takenOut: Date): Promise<void> {
  await trx
    .updateTable('vintage')
    .set((eb) => ({
      public_from: eb
        .selectFrom('release')
        .select((inner) => inner.fn.min('release.ready_for').as('first'))
        .whereRef('release.vintage_id', '=', 'vintage.id')
        .where('release.state', '=', 'scheduled'),
    }))
    .where('public_from', '>=', takenOut)
    .execute();
}
