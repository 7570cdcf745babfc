import { rm } from 'node:fs/promises';
import { removeCluster } from '../../db/cluster.ts';

/** Removes a data directory of tests with its cluster, running or not. */
export async function discard(dataDir: string): Promise<void> {
  await removeCluster(dataDir);
  await rm(dataDir, { recursive: true, force: true });
}

// As a program: for a run that is broken off and has no time left to do it.
if (process.argv[1] === import.meta.filename) await discard(process.argv[2]!);
