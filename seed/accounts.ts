import { randomBytes, randomUUID } from 'node:crypto';
import { open, rename, rm } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import type { Role } from '../src/lib/services/context.ts';

/** Who can sign in to the demo, as kept in `demo-accounts.json`. */
export interface DemoAccounts {
  accounts: DemoAccount[];
  /** The subscriber's key to the API. */
  api_key: string;
}

export interface DemoAccount {
  role: Role;
  email: string;
  password: string;
  /** Null while there is no second factor. */
  totp_secret: string | null;
}

/** A password nobody has chosen: 144 random bits. */
export function newPassword(): string {
  return randomBytes(18).toString('base64url');
}

/**
 * Keeps the accounts in the data directory, readable by its owner alone. After a crash the file is wholly there or
 * not at all; one that was there is replaced.
 */
export async function writeAccounts(dataDir: string, accounts: DemoAccounts): Promise<void> {
  const path = join(dataDir, 'demo-accounts.json');
  const temporary = join(dataDir, `.demo-accounts-${randomUUID()}`);
  try {
    const file = await open(temporary, 'wx', 0o600);
    try {
      await file.writeFile(`${JSON.stringify(accounts, null, 2)}\n`);
      await file.sync();
    } finally {
      await file.close();
    }
    await rename(temporary, path);
  } catch (error) {
    await rm(temporary, { force: true });
    throw error;
  }
  const directory = await open(dirname(path), 'r');
  try {
    await directory.sync();
  } finally {
    await directory.close();
  }
}
