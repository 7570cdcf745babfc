import { mkdtemp, readFile, readdir, rm, stat, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { type DemoAccounts, newPassword, writeAccounts } from '../../seed/accounts.ts';

const accounts: DemoAccounts = {
  accounts: [{ role: 'reviewer', email: 'reviewer@example.org', password: 'p', totp_secret: null }],
  api_key: 'key',
};

let directory: string;
beforeEach(async () => {
  directory = await mkdtemp(join(tmpdir(), 'slackwater-accounts-'));
});
afterEach(() => rm(directory, { recursive: true, force: true }));

describe('the accounts of the demo', () => {
  test('are kept where only their owner can read them', async () => {
    await writeAccounts(directory, accounts);
    const path = join(directory, 'demo-accounts.json');
    expect(JSON.parse(await readFile(path, 'utf8'))).toEqual(accounts);
    expect((await stat(path)).mode & 0o777).toBe(0o600);
  });

  test('replace what was there, whoever could read that, and leave nothing beside', async () => {
    const path = join(directory, 'demo-accounts.json');
    await writeFile(path, 'old', { mode: 0o644 });
    await writeAccounts(directory, accounts);
    expect((await stat(path)).mode & 0o777).toBe(0o600);
    expect(await readdir(directory)).toEqual(['demo-accounts.json']);
  });

  test('are not half written where they cannot be written', async () => {
    await expect(writeAccounts(join(directory, 'missing'), accounts)).rejects.toThrow('ENOENT');
    expect(await readdir(directory)).toEqual([]);
  });

  test('have passwords long enough and never twice the same', () => {
    const passwords = Array.from({ length: 100 }, newPassword);
    expect(new Set(passwords).size).toBe(100);
    for (const password of passwords) expect(password).toMatch(/^[\w-]{24}$/);
  });
});
