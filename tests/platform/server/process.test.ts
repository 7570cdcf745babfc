import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { type TestDatabase, testDatabase } from '../../setup/database.ts';
import { freePort, startServer } from '../../setup/server.ts';

let database: TestDatabase;
let dataDir: string;
beforeAll(async () => {
  database = await testDatabase();
  dataDir = await mkdtemp(join(tmpdir(), 'slackwater-process-'));
});
afterAll(async () => {
  await database.drop();
  await rm(dataDir, { recursive: true });
});

/** An empty database is seeded in demo mode only. */
const production = {
  SLACKWATER_MODE: 'production',
  SLACKWATER_SECRET: 'only-for-tests-'.repeat(3),
  SLACKWATER_SMTP_URL: 'smtp://127.0.0.1:1',
  SLACKWATER_MAIL_FROM: 'desk@example.org',
};

async function status(url: string): Promise<number | null> {
  return fetch(url).then(
    (answer) => answer.status,
    () => null,
  );
}

describe('the process', { timeout: 180_000 }, () => {
  test('runs twice on one database, and lives and ends by itself', async () => {
    const options = { databaseUrl: database.url, dataDir, env: production };
    const first = await startServer(options);
    const second = await startServer(options);
    for (const { url } of [first, second]) {
      expect(await status(`${url}/healthz`)).toBe(200);
      expect(await status(`${url}/readyz`)).toBe(200);
    }
    await first.kill();
    expect(await status(`${first.url}/healthz`)).toBeNull();
    expect(await status(`${second.url}/readyz`)).toBe(200);
    await second.stop();
    expect(await status(`${second.url}/healthz`)).toBeNull();
  });

  test('is started by npm start on the database it is given, and ended by Ctrl-C', async () => {
    const port = await freePort();
    const child = spawn(process.execPath, ['src/commands/start.mjs'], {
      env: {
        PATH: process.env.PATH,
        HOME: dataDir,
        DATABASE_URL: database.url,
        SLACKWATER_DATA_DIR: dataDir,
        PORT: String(port),
        ...production,
      },
      stdio: ['ignore', 'pipe', 'ignore'],
    });
    let spoken = '';
    const ready = new Promise<void>((resolve) => {
      child.stdout.on('data', (chunk: Buffer) => {
        spoken += chunk.toString();
        if (spoken.includes('ready at')) resolve();
      });
    });
    const gone = once(child, 'close');
    await Promise.race([ready, gone]);
    expect(spoken).toContain(`Slackwater is ready at http://127.0.0.1:${port}\n`);
    expect(await status(`http://127.0.0.1:${port}/readyz`)).toBe(200);
    child.kill('SIGINT');
    expect((await gone)[0]).toBe(0);
    expect(await status(`http://127.0.0.1:${port}/healthz`)).toBeNull();
    // Given a database, it makes no cluster of its own.
    expect(existsSync(join(dataDir, 'database-location'))).toBe(false);
  });
});
