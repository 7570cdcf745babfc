import type { NodeApp } from 'astro/app/node';
import { createServer } from 'node:http';
import { availableParallelism } from 'node:os';
import { dirname, join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { type SeedSize, seedWhereEmpty } from '../../../seed/first.ts';
import type { Env } from '../env.ts';
import { bringUpToDate, isBehind, lateReleases, redraw } from '../publication/moments.ts';
import { startPool } from '../publication/pool.ts';
import { PublishedPages } from '../publication/serve.ts';
import { type Runtime, contextFor } from '../runtime.ts';
import { loadAssets } from './assets.ts';
import { createHandler } from './handler.ts';
import { databaseUrl, openRuntime } from './runtime.ts';

export interface ServeOptions {
  env: Env;
  /** Told in words what takes time. */
  onProgress(text: string): void;
  /** How much of the demo is seeded, for tests. */
  seed?: SeedSize;
}

export interface Served {
  url: string;
  /** Stops answering, lets running answers finish, and closes what was opened. */
  close(): Promise<void>;
}

const KEEP_UP_MS = 2_000;
const SYSTEM = { id: null, role: 'system', name: 'Slackwater' } as const;

/** Runs the product in this process: seeds an empty demo, draws what another build drew, then answers. */
export async function serveSite(
  app: NodeApp,
  entry: string,
  { env, onProgress, seed }: ServeOptions,
): Promise<Served> {
  const dist = dirname(dirname(entry));
  const root = dirname(dist);
  const workers = startPool({
    entry,
    workerData: { env, root },
    threads: Math.max(1, availableParallelism() - 1),
  });
  const { runtime, close } = await openRuntime(env, { connections: 10, workers, withMail: true });
  const { log } = runtime;
  const ctx = contextFor(runtime, SYSTEM);

  if (env.mode === 'demo') await seedWhereEmpty(runtime, onProgress, seed);
  // What is in force must be answered even where a page cannot be drawn again, or something coming not at all.
  const drawn = await redraw(ctx, (done, all) => {
    if (done === all || done % 25 === 0)
      onProgress(`Drawing pages for this build, ${done} of ${all}`);
  }).catch((error: unknown) => {
    log.error({ err: error }, 'the pages of another build stay, as one cannot be drawn again');
    return 0;
  });
  if (drawn > 0) log.info({ pages: drawn }, 'drew the pages for this build');
  if (await isBehind(runtime.db, ctx.now())) {
    await bringUpToDate(ctx).catch((error: unknown) =>
      log.error({ err: error }, 'a coming moment cannot be drawn'),
    );
  }

  const pages = new PublishedPages(runtime.db, runtime.clock, runtime.store);
  await pages.start(databaseUrl(env), (error) => log.warn({ err: error }, 'pages fall behind'));
  // The very first pages count from a few seconds after they were drawn.
  while (!pages.hasPages) await sleep(100);

  const assets = await loadAssets(join(dist, 'client'), join(env.dataDir, 'assets'));
  const handle = createHandler({ app, runtime, pages, assets });
  const server = createServer((request, response) => {
    handle(request, response).catch((error: unknown) => {
      log.error({ err: error, request: response.getHeader('x-request-id') }, 'a request failed');
      if (!response.headersSent) response.writeHead(500);
      response.end();
    });
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(env.port, env.host, resolve);
  });

  const told = new Set<string>();
  const stopKeeping = keepUp(
    async () => {
      await tellLate(runtime, told);
      if (await isBehind(runtime.db, runtime.clock.now())) await bringUpToDate(ctx);
    },
    (error) => log.error({ err: error }, 'a coming release is not ready'),
  );

  return {
    url: env.publicUrl,
    async close() {
      stopKeeping();
      const closed = new Promise((resolve) => server.close(resolve));
      server.closeIdleConnections();
      await Promise.race([closed, sleep(5_000)]);
      server.closeAllConnections();
      await pages.stop();
      await close();
    },
  };
}

/** Says once of each release that missed its second that it is late; it needs a newly announced time. */
async function tellLate({ db, clock, log }: Runtime, told: Set<string>): Promise<void> {
  for (const id of await lateReleases(db, clock.now())) {
    if (told.has(id)) continue;
    told.add(id);
    log.error({ release: id }, 'a release missed its second: its pages were not ready');
  }
}

/** Looks again and again whether a release waits for its pages; one that another process left behind is drawn here. */
function keepUp(look: () => Promise<void>, onTrouble: (error: unknown) => void): () => void {
  let timer: NodeJS.Timeout | undefined;
  let stopped = false;
  const again = () => {
    if (stopped) return;
    timer = setTimeout(() => void look().catch(onTrouble).then(again), KEEP_UP_MS);
    timer.unref();
  };
  again();
  return () => {
    stopped = true;
    clearTimeout(timer);
  };
}
