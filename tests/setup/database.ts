import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { inject } from 'vitest';
import { connect, type Db } from '../../db/connection.ts';
import { migrate } from '../../db/migrate.ts';

const TEMPLATE = 'migrated';

/** A database of a test file's own. */
export interface TestDatabase {
  db: Db;
  url: string;
  /** Closes `db` and removes the database, whoever else is still connected. */
  drop(): Promise<void>;
}

/**
 * A new, migrated and otherwise empty database, cloned from a template in some 50 ms. Make one in `beforeAll`, drop
 * it in `afterAll`.
 */
export async function testDatabase(): Promise<TestDatabase> {
  await ensureTemplate();
  const name = `test_${randomBytes(6).toString('hex')}`;
  await administer((client) => client.query(`create database ${name} template ${TEMPLATE}`));
  const url = urlOf(name);
  const db = connect(url);
  return {
    db,
    url,
    drop: async () => {
      await db.destroy();
      await administer((client) => client.query(`drop database if exists ${name} with (force)`));
    },
  };
}

/** Makes the template the first time any test file of the run asks for it; the others wait. */
async function ensureTemplate(): Promise<void> {
  await administer(async (client) => {
    await client.query(`select pg_advisory_lock(hashtext($1))`, [TEMPLATE]);
    const { rowCount } = await client.query('select from pg_database where datname = $1', [
      TEMPLATE,
    ]);
    if (rowCount !== 0) return;
    const unfinished = `${TEMPLATE}_unfinished`;
    await client.query(`drop database if exists ${unfinished} with (force)`);
    await client.query(`create database ${unfinished} template template0`);
    const db = connect(urlOf(unfinished));
    try {
      await migrate(db);
    } finally {
      await db.destroy();
    }
    await client.query(`alter database ${unfinished} rename to ${TEMPLATE}`);
  });
}

async function administer<T>(work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: urlOf('postgres') });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

function urlOf(database: string): string {
  const url = new URL(inject('clusterUrl'));
  url.pathname = `/${database}`;
  return url.href;
}
