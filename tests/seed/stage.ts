import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pool } from '../../db/connection.ts';
import { createAuth } from '../../src/lib/auth.ts';
import { startClock } from '../../src/lib/clock.ts';
import { readEnv } from '../../src/lib/env.ts';
import { openLog } from '../../src/lib/log.ts';
import type { Mailer } from '../../src/lib/mail.ts';
import { folderStore } from '../../src/lib/publication/store.ts';
import type { Workers } from '../../src/lib/publication/workers.ts';
import type { Runtime } from '../../src/lib/runtime.ts';
import { testDatabase } from '../setup/database.ts';
import { plainWorkers } from '../setup/workers.ts';

export interface Stage {
  runtime: Runtime;
  /** Addresses of the pages that were drawn, with the time each was drawn for. */
  drawn: { address: string; at: Date }[];
  close(): Promise<void>;
}

/** A runtime on an empty database; it computes as the product does and draws pages that hold their address only. */
export async function seedStage(): Promise<Stage> {
  const database = await testDatabase();
  const dataDir = await mkdtemp(join(tmpdir(), 'slackwater-seed-'));
  const env = readEnv({
    SLACKWATER_MODE: 'demo',
    DATABASE_URL: database.url,
    SLACKWATER_DATA_DIR: dataDir,
  });
  const mail: Mailer = { send: async () => {}, close: async () => {} };
  const clock = await startClock(database.db);
  const people = pool(database.url, 2);
  const drawn: Stage['drawn'] = [];
  return {
    drawn,
    runtime: {
      env,
      db: database.db,
      clock,
      store: folderStore(join(dataDir, 'artefacts')),
      workers: drawingWorkers(drawn),
      mail,
      auth: createAuth({ pool: people, env, mail }),
      log: openLog(env),
      build: 'test',
    },
    async close() {
      clock.stop();
      await people.end();
      await database.drop();
      await rm(dataDir, { recursive: true, force: true });
    },
  };
}

function drawingWorkers(drawn: Stage['drawn']): Workers {
  return plainWorkers({
    async page(address, { at, include }) {
      // What is drawn to see whether it can be is not put in force.
      if (!include) drawn.push({ address, at });
      const body = new TextEncoder().encode(`${address} at ${at.toISOString()}`);
      const headers = { 'content-type': 'text/html; charset=utf-8' };
      return { status: address === '/404/' ? 404 : 200, headers, body };
    },
  });
}
