import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { removeCluster, startCluster } from '../../db/cluster.ts';
import { connect } from '../../db/connection.ts';
import { dumpSchema } from '../../db/dumpSchema.ts';
import { migrate } from '../../db/migrate.ts';
import { ROOT } from './run.mjs';

/** Writes db/schema.sql anew: what all migrations make of an empty database, for whoever reviews one. */
async function writeSchema(): Promise<void> {
  const dataDir = await mkdtemp(join(tmpdir(), 'slackwater-schema-'));
  const cluster = await startCluster(dataDir, { settings: { fsync: 'off' } });
  try {
    const db = connect(cluster.url, 1);
    await migrate(db).finally(() => db.destroy());
    await writeFile(join(ROOT, 'db/schema.sql'), await dumpSchema(cluster.url));
  } finally {
    await cluster.stop();
    await removeCluster(dataDir);
    await rm(dataDir, { recursive: true });
  }
}

await writeSchema();
