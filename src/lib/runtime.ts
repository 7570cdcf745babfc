import type { Db } from '../../db/connection.ts';
import type { Auth } from './auth.ts';
import type { Clock } from './clock.ts';
import type { Env } from './env.ts';
import type { Logger } from './log.ts';
import type { Mailer } from './mail.ts';
import type { ArtefactStore } from './publication/store.ts';
import type { Workers } from './publication/workers.ts';
import type { Actor, ServiceContext } from './services/context.ts';

/** What one process has, made once at its start (src/server.ts) and handed to pages and the API; never a global. */
export interface Runtime {
  env: Env;
  db: Db;
  clock: Clock;
  store: ArtefactStore;
  workers: Workers;
  mail: Mailer;
  auth: Auth;
  log: Logger;
  build: string;
}

/** The context of a verb that this person calls now. */
export function contextFor(runtime: Runtime, actor: Actor): ServiceContext {
  return {
    db: runtime.db,
    now: () => runtime.clock.now(),
    actor,
    store: runtime.store,
    workers: runtime.workers,
    publicUrl: runtime.env.publicUrl,
    build: runtime.build,
  };
}
