import { readFile } from 'node:fs/promises';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { pathToFileURL } from 'node:url';
import { startCluster } from '../../db/cluster.ts';
import { connect } from '../../db/connection.ts';
import { migrate } from '../../db/migrate.ts';
import { type Env, EnvError, readEnv } from '../lib/env.ts';
import { openLog } from '../lib/log.ts';
import type { ServeOptions, Served } from '../lib/serving/serve.ts';
import { buildWhenStale, ENTRY } from './build.mjs';
import { installFromDebian } from './install.mjs';
import type { Progress } from './progress.mjs';
import { CommandError, ROOT } from './run.mjs';

interface Options {
  progress: Progress;
  /** Aborted when the start is broken off. */
  signal: AbortSignal;
  /** Told how to stop what was started, in order; called from the last to the first. */
  closers: (() => Promise<void>)[];
  /** Called when no TypeScript has to be read any more. */
  onLoaded: () => void;
}

/** From a checked environment to a served site: database, migrations, build, server, and the ready line. */
export async function serve({ progress, signal, closers, onLoaded }: Options): Promise<void> {
  const env = environment();
  await checkPort(env);
  const databaseUrl =
    env.databaseUrl ?? (await privateDatabase(env, { progress, signal, closers }));
  signal.throwIfAborted();
  await migrateDatabase(databaseUrl, env, progress);
  signal.throwIfAborted();
  await buildWhenStale(progress, signal);
  onLoaded();

  progress.step('Starting the server');
  const served = await runServer({
    env: { ...env, databaseUrl },
    onProgress: (text) => progress.step(text),
  });
  closers.push(() => served.close());
  signal.throwIfAborted();
  progress.done();
  console.log(`\nSlackwater is ready at ${localAddress(env)}`);
  if (env.mode === 'demo') await tellDemoPeople(env);
}

function environment(): Env {
  try {
    return readEnv(process.env, ROOT);
  } catch (error) {
    if (!(error instanceof EnvError)) throw error;
    throw new CommandError(`${error.message}\nSet the environment right and start again.`);
  }
}

const PORT_TRIES = 8;

/** Finds an occupied port before anything slow is done; a server just killed may need a moment to leave it. */
async function checkPort({ host, port }: Env): Promise<void> {
  for (let attempt = 1; ; attempt += 1) {
    const code = await bindFault(host, port);
    if (code === null) return;
    if (code === 'EADDRINUSE' && attempt < PORT_TRIES) await sleep(250);
    else throw portFault(host, port, code);
  }
}

function bindFault(host: string, port: number): Promise<string | null> {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', (error: NodeJS.ErrnoException) => resolve(error.code ?? error.message));
    server.listen(port, host, () => server.close(() => resolve(null)));
  });
}

function portFault(host: string, port: number, code: string): CommandError {
  if (code === 'EADDRINUSE') {
    return new CommandError(
      `PORT ${port} on ${host} is used by another program: stop it, or set PORT to a free one.`,
    );
  }
  if (code === 'EACCES') {
    return new CommandError(
      `PORT ${port} may not be opened by this user: set PORT to a number from 1024 on.`,
    );
  }
  return new CommandError(
    `HOST ${host} is not an address of this machine (${code}): set HOST to one that is.`,
  );
}

async function privateDatabase(
  env: Env,
  { progress, signal, closers }: Pick<Options, 'progress' | 'signal' | 'closers'>,
): Promise<string> {
  await installFromDebian(['postgresql'], progress, signal);
  progress.step('Starting the database');
  const starting = startCluster(env.dataDir, { onProgress: (text) => progress.step(text) });
  // Known before it runs: broken off now, it is let finish and then stopped.
  closers.push(async () => (await starting.catch(() => null))?.stop());
  return (await starting).url;
}

async function migrateDatabase(url: string, env: Env, progress: Progress): Promise<void> {
  const db = connect(url, 2);
  try {
    progress.step('Bringing the database up to date');
    await migrate(db);
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw new CommandError(
      env.databaseUrl
        ? `The database at DATABASE_URL cannot be used (${why}): check the address and that its server runs.`
        : `The database could not be brought up to date (${why}): restore a backup, or set SLACKWATER_DATA_DIR to a new directory.`,
    );
  } finally {
    await db.destroy();
  }
}

/** The built server in this process. What goes wrong in it is kept whole in the log and told in a sentence. */
async function runServer(options: ServeOptions): Promise<Served> {
  try {
    const entry: { serve: typeof runServer } = await import(pathToFileURL(ENTRY).href);
    return await entry.serve(options);
  } catch (error) {
    openLog(options.env).fatal({ err: error }, 'the server could not start');
    const why = error instanceof Error ? error.message : String(error);
    throw new CommandError(
      `The server could not start (${why}): its log ${options.env.mode === 'demo' ? `in ${options.env.dataDir} ` : ''}has the details.`,
    );
  }
}

function localAddress({ host, port }: Env): string {
  const reachable = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host;
  return `http://${reachable.includes(':') ? `[${reachable}]` : reachable}:${port}`;
}

interface DemoAccounts {
  accounts: { role: string; email: string }[];
}

/** Who can sign in, and where the passwords are; they are never printed. */
async function tellDemoPeople(env: Env): Promise<void> {
  const path = join(env.dataDir, 'demo-accounts.json');
  const text = await readFile(path, 'utf8').catch(() => null);
  if (text === null) return;
  const { accounts } = JSON.parse(text) as DemoAccounts;
  const width = Math.max(...accounts.map(({ role }) => role.length));
  console.log('\nPeople of the demo:');
  for (const { role, email } of accounts) console.log(`  ${role.padEnd(width)}  ${email}`);
  console.log(`Their passwords are in ${path}`);
}
