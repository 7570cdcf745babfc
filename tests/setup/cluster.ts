import { spawn } from 'node:child_process';
import { mkdtempSync } from 'node:fs';
import { readdir, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { TestProject } from 'vitest/node';
import { isClusterInUse, startCluster } from '../../db/cluster.ts';
import { discard } from './discard.ts';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Address of the run's own PostgreSQL; tests make their databases on it. */
    clusterUrl: string;
  }
}

const PREFIX = 'slackwater-test-';

interface RunningCluster {
  url: Promise<string>;
  users: number;
  remove: () => Promise<void>;
}

// Several projects name this file, and Vitest loads it anew for each, in one process: the process
// itself is the only place they share, and one cluster is enough.
const shared = globalThis as { slackwaterTestCluster?: RunningCluster };

/** One throw-away cluster a run, started by the first project that needs it, removed by the last. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const cluster = (shared.slackwaterTestCluster ??= start());
  cluster.users += 1;
  project.provide('clusterUrl', await cluster.url);
  return async () => {
    cluster.users -= 1;
    if (cluster.users === 0) await cluster.remove();
  };
}

function start(): RunningCluster {
  const dataDir = mkdtempSync(join(tmpdir(), PREFIX));
  const started = sweep().then(() =>
    startCluster(dataDir, {
      settings: {
        // Nothing of a test outlives the run.
        fsync: 'off',
        full_page_writes: 'off',
        synchronous_commit: 'off',
        max_connections: '300',
      },
    }),
  );
  let removed = false;
  process.once('exit', () => {
    if (!removed) discardLater(dataDir);
  });
  return {
    url: started.then((cluster) => cluster.url),
    users: 0,
    remove: async () => {
      await (await started).stop();
      await discard(dataDir);
      removed = true;
    },
  };
}

/** Vitest ends at a signal without any teardown: another process does it then. */
function discardLater(dataDir: string): void {
  const program = fileURLToPath(new URL('discard.ts', import.meta.url));
  spawn(process.execPath, ['--import', 'tsx', program, dataDir], {
    detached: true,
    stdio: 'ignore',
  }).unref();
}

/** Removes what a killed run left half an hour ago or earlier; its cluster would run on for ever. */
async function sweep(): Promise<void> {
  for (const name of await readdir(tmpdir())) {
    if (!name.startsWith(PREFIX)) continue;
    const dataDir = join(tmpdir(), name);
    const made = (await stat(dataDir).catch(() => null))?.mtimeMs ?? Date.now();
    // Runs beside ours are let alone, also in the moments when they hold no lock.
    if (Date.now() - made < 30 * 60_000 || (await isClusterInUse(dataDir))) continue;
    await discard(dataDir);
  }
}
