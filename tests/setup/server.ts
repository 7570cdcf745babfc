import { fork } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { fileURLToPath } from 'node:url';
import type { SeedSize } from '../../seed/first.ts';
import { readEnv } from '../../src/lib/env.ts';

export interface TestServer {
  url: string;
  pid: number;
  /** Ends it as a signal would; answers when it is gone. */
  stop(): Promise<void>;
  /** Ends it with -9. */
  kill(): Promise<void>;
}

export interface ServerOptions {
  databaseUrl: string;
  /** A directory of the test's own; two servers may share one. */
  dataDir: string;
  /** A free one where none is given. */
  port?: number;
  /** More of the environment, such as SLACKWATER_MODE; what is given here wins. */
  env?: Record<string, string>;
  /** How much of the demo an empty database gets; all of it takes long. */
  seed?: SeedSize;
}

const PROCESS = fileURLToPath(new URL('serverProcess.mjs', import.meta.url));
const READY_MS = 90_000;

/** Runs the built server as a process of its own until it answers; the build is made by tests/setup/build.ts. */
export async function startServer(options: ServerOptions): Promise<TestServer> {
  const env = readEnv({
    SLACKWATER_MODE: 'demo',
    DATABASE_URL: options.databaseUrl,
    SLACKWATER_DATA_DIR: options.dataDir,
    PORT: String(options.port ?? (await freePort())),
    ...options.env,
  });
  const child = fork(PROCESS, { execArgv: [], silent: true });
  let spoken = '';
  child.stdout?.on('data', (chunk: Buffer) => (spoken += chunk.toString()));
  child.stderr?.on('data', (chunk: Buffer) => (spoken += chunk.toString()));
  const gone = once(child, 'exit');
  child.send({ env, seed: options.seed });

  const ready = once(child, 'message', { signal: AbortSignal.timeout(READY_MS) });
  const first = await Promise.race([ready, gone.then(() => null)]).catch(() => null);
  if (first === null) {
    child.kill('SIGKILL');
    throw new Error(`The server did not become ready. It said:\n${spoken}`);
  }
  const [{ url }] = first as [{ url: string }];
  const end = async (signal: NodeJS.Signals): Promise<void> => {
    child.kill(signal);
    await gone;
  };
  return { url, pid: child.pid!, stop: () => end('SIGTERM'), kill: () => end('SIGKILL') };
}

/** A port that nobody listens on now. */
export async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  server.close();
  await once(server, 'close');
  return typeof address === 'object' && address ? address.port : 0;
}
