import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { TestProject } from 'vitest/node';
import { isClusterInUse, removeCluster, startCluster } from '../../db/cluster.ts';

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
  const dataDir = mkdtemp(join(tmpdir(), PREFIX));
  const started = sweep()
    .then(() => dataDir)
    .then((directory) =>
      startCluster(directory, {
        settings: {
          // Nothing of a test outlives the run.
          fsync: 'off',
          full_page_writes: 'off',
          synchronous_commit: 'off',
          max_connections: '300',
        },
      }),
    );
  return {
    url: started.then((cluster) => cluster.url),
    users: 0,
    remove: async () => {
      await (await started).stop();
      await discard(await dataDir);
    },
  };
}

async function discard(dataDir: string): Promise<void> {
  await removeCluster(dataDir);
  await rm(dataDir, { recursive: true, force: true });
}

/** Removes what a killed run left; its cluster would run on for ever. */
async function sweep(): Promise<void> {
  for (const name of await readdir(tmpdir())) {
    const dataDir = join(tmpdir(), name);
    if (!name.startsWith(PREFIX)) continue;
    const located = await readdir(dataDir).catch((): string[] => []);
    // Without its pointer a run beside us has only just made the directory.
    if (located.includes('database-location') && !(await isClusterInUse(dataDir))) {
      await discard(dataDir);
    }
  }
}
