import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync } from 'node:fs';
import { mkdtemp, readFile, rm, stat, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { isClusterInUse, removeCluster, startCluster } from '../../../db/cluster.ts';

const settings = { fsync: 'off' };

let dataDir: string;
beforeAll(async () => {
  dataDir = await mkdtemp(join(tmpdir(), 'slackwater-test-cluster-'));
});
afterAll(async () => {
  await removeCluster(dataDir);
  await rm(dataDir, { recursive: true });
});

async function query(url: string, text: string): Promise<unknown[]> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    return (await client.query(text)).rows;
  } finally {
    await client.end();
  }
}

async function home(): Promise<string> {
  return dirname((await readFile(join(dataDir, 'database-location'), 'utf8')).trim());
}

/** Starts the cluster in another process, which then waits to be killed. */
async function startElsewhere(): Promise<{ child: ChildProcess; url: string }> {
  const module = pathToFileURL('db/cluster.ts').href;
  const program = `
    import(${JSON.stringify(module)})
      .then(({ startCluster }) => startCluster(${JSON.stringify(dataDir)}))
      .then(({ url }) => process.stdout.write(url));
    setInterval(() => {}, 1000);`;
  const child = spawn(process.execPath, ['--import', 'tsx', '--eval', program], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const [url] = await once(child.stdout!, 'data');
  return { child, url: String(url) };
}

async function kill(child: ChildProcess): Promise<void> {
  const gone = once(child, 'exit');
  child.kill('SIGKILL');
  await gone;
}

describe('the private cluster', () => {
  test('keeps what was written over a stop and a start, on the port it had', async () => {
    const first = await startCluster(dataDir, { settings });
    await query(first.url, 'create table kept as select 7 as value');
    await first.stop();
    const second = await startCluster(dataDir, { settings });
    expect(second.url).toBe(first.url);
    expect(await query(second.url, 'select value from kept')).toEqual([{ value: 7 }]);
    await second.stop();
  });

  test('asks for a password, listens on loopback only and has no socket', async () => {
    const { url, stop } = await startCluster(dataDir, { settings });
    const wrong = new URL(url);
    wrong.password = 'wrong';
    await expect(query(wrong.href, 'select 1')).rejects.toThrow('password authentication failed');
    const [row] = await query(
      url,
      `select current_setting('listen_addresses') as host, current_setting('unix_socket_directories') as sockets`,
    );
    expect(row).toEqual({ host: '127.0.0.1', sockets: '' });
    expect((await stat(join(await home(), 'password'))).mode & 0o777).toBe(0o600);
    await stop();
  });

  test('belongs to one process at a time', async () => {
    const cluster = await startCluster(dataDir, { settings });
    expect(await isClusterInUse(dataDir)).toBe(true);
    await expect(startCluster(dataDir)).rejects.toThrow(
      `Another Slackwater is running on the data directory ${dataDir}`,
    );
    await cluster.stop();
    expect(await isClusterInUse(dataDir)).toBe(false);
    expect(existsSync(`${await home()}.lock`)).toBe(false);
  });

  test('is adopted where only its process was killed', async () => {
    const { child, url } = await startElsewhere();
    const [before] = await query(url, 'select pg_postmaster_start_time()::text as since');
    await kill(child);
    const adopted = await startCluster(dataDir);
    expect(adopted.url).toBe(url);
    const [after] = await query(url, 'select pg_postmaster_start_time()::text as since');
    expect(after).toEqual(before);
    await adopted.stop();
  });

  test('recovers where everything was killed and its number belongs to another process', async () => {
    const { child, url } = await startElsewhere();
    const pidFile = join(await home(), 'data', 'postmaster.pid');
    const [pid, ...rest] = (await readFile(pidFile, 'utf8')).split('\n');
    await kill(child);
    process.kill(Number(pid), 'SIGKILL');
    await writeFile(pidFile, [process.pid, ...rest].join('\n'));
    await writeFile(`${await home()}.lock`, `${process.pid} 1`);
    const cluster = await startCluster(dataDir, { settings });
    expect(await query(cluster.url, 'select value from kept')).toEqual([{ value: 7 }]);
    expect(cluster.url).toBe(url);
    await cluster.stop();
  });

  test('is put aside, not deleted, where its data directory was removed by hand', async () => {
    if (process.getuid?.() !== 0) return; // Elsewhere the cluster is in the data directory itself.
    await rm(join(dataDir, 'database-location'));
    const told: string[] = [];
    const cluster = await startCluster(dataDir, {
      settings,
      onProgress: (text) => told.push(text),
    });
    await expect(query(cluster.url, 'select value from kept')).rejects.toThrow('does not exist');
    await cluster.stop();
    const aside = /is kept in (\S+)/.exec(told[0]!)![1]!;
    expect(existsSync(join(aside, 'data', 'PG_VERSION'))).toBe(true);
    await rm(aside, { recursive: true });
  });

  test('is refused where another version of PostgreSQL made it', async () => {
    const file = join(await home(), 'data', 'PG_VERSION');
    await writeFile(file, '13\n');
    await expect(startCluster(dataDir)).rejects.toThrow(/was made by PostgreSQL 13, and this is/);
    await writeFile(file, '15\n');
  });

  test('is refused where its directory cannot be made', async () => {
    const file = join(dataDir, 'a-file');
    await writeFile(file, '');
    await expect(startCluster(join(file, 'below'))).rejects.toThrow(
      /The data directory .* cannot be written .*SLACKWATER_DATA_DIR/,
    );
  });
});
