import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { inject } from 'vitest';
import { connect, type Db } from '../../db/connection.ts';
import { templates, type TemplateName } from './templates.ts';

/** A database of a test file's own. */
export interface TestDatabase {
  db: Db;
  url: string;
  /** Closes `db` and removes the database, whoever else is still connected. */
  drop(): Promise<void>;
}

/**
 * A new database, cloned from a template in some 50 ms: `migrated` is empty, `seeded` has the small
 * scenario. Make one in `beforeAll`, drop it in `afterAll`.
 */
export async function testDatabase(template: TemplateName = 'migrated'): Promise<TestDatabase> {
  await ensureTemplate(template);
  const name = `test_${randomBytes(6).toString('hex')}`;
  await administer((client) => client.query(`create database ${name} template ${template}`));
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

/** Makes a template the first time any test file of the run asks for it; the others wait. */
async function ensureTemplate(name: TemplateName): Promise<void> {
  const { base, fill } = templates[name];
  if (base) await ensureTemplate(base);
  await administer(async (client) => {
    await client.query(`select pg_advisory_lock(hashtext($1))`, [name]);
    const { rowCount } = await client.query('select from pg_database where datname = $1', [name]);
    if (rowCount !== 0) return;
    const unfinished = `${name}_unfinished`;
    await client.query(`drop database if exists ${unfinished} with (force)`);
    await client.query(`create database ${unfinished} template ${base ?? 'template0'}`);
    const db = connect(urlOf(unfinished));
    try {
      await fill(db, urlOf(unfinished));
    } finally {
      await db.destroy();
    }
    await client.query(`alter database ${unfinished} rename to ${name}`);
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
