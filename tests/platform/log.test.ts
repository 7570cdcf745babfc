import { mkdtemp, readFile, rm, stat, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { openLog } from '../../src/lib/log.ts';

let dataDir: string;
beforeEach(async () => {
  dataDir = await mkdtemp(join(tmpdir(), 'slackwater-log-'));
});
afterEach(() => rm(dataDir, { recursive: true }));

test('a line of the log is JSON without anything that names a person', async () => {
  const log = openLog({ mode: 'demo', dataDir });
  const fault = Object.assign(new Error('duplicate key'), {
    detail: 'Key (email)=(a@example.org) already exists.',
  });
  log.info({ email: 'a@example.org', person: { name: 'Ada', password: 'x' }, id: 7 }, 'signed in');
  log.error({ err: fault }, 'failed');
  const text = await readFile(join(dataDir, 'slackwater.log'), 'utf8');
  const lines = text
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line));
  expect(lines[0]).toMatchObject({ msg: 'signed in', id: 7, person: {} });
  expect(lines[1].err.message).toBe('duplicate key');
  expect(text).not.toMatch(/example\.org|Ada|hostname/);
  expect((await stat(join(dataDir, 'slackwater.log'))).mode & 0o777).toBe(0o600);
});

test('a log that has grown is put aside at the next start', async () => {
  const file = join(dataDir, 'slackwater.log');
  await writeFile(file, 'x'.repeat(11 * 1024 * 1024));
  openLog({ mode: 'demo', dataDir }).info('new');
  expect((await stat(`${file}.1`)).size).toBe(11 * 1024 * 1024);
  expect((await stat(file)).size).toBeLessThan(200);
});
