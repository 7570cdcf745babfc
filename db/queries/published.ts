import { type Transaction, sql } from 'kysely';
import type { Db } from '../connection.ts';
import type { Database } from '../tables.ts';

/** A row of `published` as a serving process holds it. */
export interface PublishedRow {
  address: string;
  visible_from: Date;
  artefact_hash: string;
  status: number;
  headers: Record<string, string>;
  drawn_at: Date;
}

const COLUMNS = [
  'published.address',
  'published.visible_from',
  'published.artefact_hash',
  'published.status',
  'published.headers',
  'published.drawn_at',
] as const;

/** How often `published` has changed; every change raises it. */
export async function generationOf(db: Db): Promise<bigint> {
  const row = await db.selectFrom('publication').select('generation').executeTakeFirstOrThrow();
  return BigInt(row.generation);
}

/** What a process that starts at `at` needs: of every address the row in force, and all coming ones. */
export async function currentRows(db: Db, at: Date): Promise<PublishedRow[]> {
  const inForce = await db
    .selectFrom('published')
    .innerJoin('moment', 'moment.visible_from', 'published.visible_from')
    .distinctOn('published.address')
    .select(COLUMNS)
    .where('moment.ready', '=', true)
    .where('published.visible_from', '<=', at)
    .orderBy('published.address')
    .orderBy('published.visible_from', 'desc')
    .execute();
  const coming = await db
    .selectFrom('published')
    .select(COLUMNS)
    .where('published.visible_from', '>', at)
    .execute();
  return [...inForce, ...coming];
}

/** What changed since a process last looked: rows of a later generation, and all that were still to come then. */
export async function rowsSince(db: Db, generation: bigint, at: Date): Promise<PublishedRow[]> {
  return db
    .selectFrom('published')
    .select(COLUMNS)
    .where((eb) =>
      eb.or([
        eb('published.generation', '>', generation.toString()),
        eb('published.visible_from', '>', at),
      ]),
    )
    .execute();
}

/** Ready moments after `since`. */
export async function moments(db: Db, since: Date): Promise<Date[]> {
  const rows = await db
    .selectFrom('moment')
    .select('visible_from')
    .where('ready', '=', true)
    .where('visible_from', '>', since)
    .execute();
  return rows.map((row) => row.visible_from);
}

/** Takes the next generation; the row lock makes publications take turns. Processes are told at commit. */
export async function nextGeneration(trx: Transaction<Database>): Promise<string> {
  const row = await trx
    .updateTable('publication')
    .set({ generation: sql`generation + 1` })
    .returning('generation')
    .executeTakeFirstOrThrow();
  await sql`select pg_notify('published', ${row.generation})`.execute(trx);
  return row.generation;
}

/** Hash in force at `at` of each of the addresses that has one. */
export async function currentHashes(
  db: Db,
  addresses: string[],
  at: Date,
): Promise<Map<string, string>> {
  const rows = await db
    .selectFrom('published')
    .innerJoin('moment', 'moment.visible_from', 'published.visible_from')
    .distinctOn('published.address')
    .select(['published.address', 'published.artefact_hash'])
    .where('moment.ready', '=', true)
    .where('published.visible_from', '<=', at)
    .where('published.address', 'in', addresses)
    .orderBy('published.address')
    .orderBy('published.visible_from', 'desc')
    .execute();
  return new Map(rows.map((row) => [row.address, row.artefact_hash]));
}
