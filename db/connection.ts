import { Kysely, PostgresDialect } from 'kysely';
import pg from 'pg';
import type { Database } from './tables.ts';

// A calendar date has no time zone: as a Date it would shift by a day west of Greenwich.
pg.types.setTypeParser(pg.types.builtins.DATE, (text) => text);
// numeric[] keeps the digits of the file; the driver's own parser would round them to doubles.
const NUMERIC_ARRAY = 1231 as Parameters<typeof pg.types.setTypeParser>[0];
pg.types.setTypeParser(NUMERIC_ARRAY, (text: string) =>
  text === '{}' ? [] : text.slice(1, -1).split(','),
);

export type Db = Kysely<Database>;

/** A database connection pool; `max` connections at most. Close it with `db.destroy()`. */
export function connect(url: string, max = 10): Db {
  return databaseOn(pool(url, max));
}

/** The database over a pool that others (sign-in) use too; `destroy` closes the pool. */
export function databaseOn(shared: pg.Pool): Db {
  return new Kysely<Database>({ dialect: new PostgresDialect({ pool: shared }) });
}

/** The pool itself, for what speaks to PostgreSQL without Kysely (sign-in, LISTEN). */
export function pool(url: string, max = 10): pg.Pool {
  const made = new pg.Pool({
    connectionString: url,
    max,
    connectionTimeoutMillis: 5_000,
    keepAlive: true,
    query_timeout: 120_000,
  });
  // A connection that breaks while it is lent out and idle would end the process too: whoever holds it finds out at
  // the next query.
  made.on('connect', (client) => client.on('error', () => {}));
  // An idle connection that the server closes must not end the process; the next query reconnects.
  made.on('error', () => {});
  return made;
}

/**
 * Calls `heard` at every notification on a channel, over a connection of its own that is made again, with the
 * call repeated, after it breaks. Answers the function that stops it.
 */
export async function listen(
  url: string,
  channel: string,
  heard: (payload: string) => void,
): Promise<() => Promise<void>> {
  let stopped = false;
  let client: pg.Client | undefined;
  let retry: NodeJS.Timeout | undefined;
  const again = () => {
    if (stopped) return;
    retry = setTimeout(() => void open().catch(again), 1_000);
    retry.unref();
  };
  const open = async () => {
    const made = new pg.Client({ connectionString: url, keepAlive: true });
    made.on('notification', (message) => heard(message.payload ?? ''));
    made.on('error', () => {});
    made.on('end', () => {
      if (client === made) again();
    });
    await made.connect();
    await made.query(`listen ${pg.escapeIdentifier(channel)}`);
    client = made;
    // Whatever was said while nobody listened is lost: look once.
    heard('');
  };
  await open();
  return async () => {
    stopped = true;
    clearTimeout(retry);
    await client?.end();
  };
}
