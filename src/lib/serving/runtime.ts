import { join } from 'node:path';
import { databaseOn, pool as openPool } from '../../../db/connection.ts';
import { createAuth } from '../auth.ts';
import { buildId } from '../build.ts';
import { startClock } from '../clock.ts';
import type { Env } from '../env.ts';
import { openLog } from '../log.ts';
import { type Mailer, startMailer } from '../mail.ts';
import { folderStore } from '../publication/store.ts';
import type { Workers } from '../publication/workers.ts';
import type { Runtime } from '../runtime.ts';

/** A runtime and how to close what it opened. */
export interface RuntimeParts {
  runtime: Runtime;
  close(): Promise<void>;
}

/**
 * Opens what one process or one worker thread needs. A thread has neither workers nor mail of its own: it only
 * draws, and asking it for either is a fault of the program.
 */
export async function openRuntime(
  env: Env,
  options: { connections: number; workers?: Workers; withMail?: boolean },
): Promise<RuntimeParts> {
  const pool = openPool(databaseUrl(env), options.connections);
  const db = databaseOn(pool);
  const clock = await startClock(db);
  const mail = options.withMail ? await startMailer(env) : noMail();
  const runtime: Runtime = {
    env,
    db,
    clock,
    store: folderStore(join(env.dataDir, 'artefacts')),
    workers: options.workers ?? noWorkers(),
    mail,
    log: openLog(env),
    auth: createAuth({ pool, env, mail }),
    // The public address stands in the pages, so another one makes them another build's.
    build: `${buildId} ${env.publicUrl}`,
  };
  return {
    runtime,
    async close() {
      clock.stop();
      await mail.close();
      await options.workers?.close();
      await db.destroy();
    },
  };
}

/** The database's address, which whoever starts the server puts in where the private cluster is used. */
export function databaseUrl(env: Env): string {
  if (!env.databaseUrl) throw new Error('The server was started without a database address');
  return env.databaseUrl;
}

function noWorkers(): Workers {
  const refuse = () => Promise.reject(new Error('A worker thread asked for a worker'));
  return {
    page: refuse,
    shareImage: refuse,
    compute: refuse,
    examine: refuse,
    compress: refuse,
    close: async () => {},
  };
}

function noMail(): Mailer {
  return {
    send: () => Promise.reject(new Error('A worker thread sends no mail')),
    close: async () => {},
  };
}
