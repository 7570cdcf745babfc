import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { DemoAccounts } from '../../seed/accounts.ts';
import { seedDemo } from '../../seed/seed.ts';
import { currentRows } from '../../db/queries/published.ts';
import { redraw } from '../../src/lib/publication/moments.ts';
import { contextFor } from '../../src/lib/runtime.ts';
import { verifyAudit } from '../../src/lib/services/audit.ts';
import { upcoming } from '../../src/lib/services/calendar/upcoming.ts';
import { keyVerifier } from '../../src/lib/services/keys/verify.ts';
import { listReleases } from '../../src/lib/services/releases/public.ts';
import { type Stage, seedStage } from './stage.ts';

const NOW = new Date('2031-10-01T13:20:00Z');
const MINUTE = 60_000;
const SYSTEM = { id: null, role: 'system', name: 'Slackwater' } as const;

let stage: Stage;
let accounts: DemoAccounts;
const progress: string[] = [];

beforeAll(async () => {
  stage = await seedStage();
  const onProgress = (text: string) => progress.push(text);
  accounts = await seedDemo(stage.runtime, {
    now: NOW,
    economies: ['XAL', 'XDU', 'XES'],
    months: 3,
    onProgress,
  });
});
afterAll(() => stage.close());

const idsAt = async (at: Date) =>
  (await listReleases(stage.runtime.db, { at })).map(({ id }) => id).sort();

describe('the seeded demo', () => {
  test('has people for every role, with passwords of their own', () => {
    expect(accounts.accounts.map(({ role }) => role)).toEqual([
      'administrator',
      'editor',
      'editor',
      'reviewer',
      'subscriber',
    ]);
    for (const { email, password, totp_secret } of accounts.accounts) {
      expect(email).toMatch(/^[a-z-]+@example\.org$/);
      expect(password.length).toBeGreaterThanOrEqual(24);
      expect(totp_secret).toBeNull();
    }
    expect(new Set(accounts.accounts.map(({ password }) => password)).size).toBe(5);
  });

  test('has the newest month out where it is due, and every month before', async () => {
    expect(await idsAt(NOW)).toEqual([
      'XAL-2031-06-r1',
      'XAL-2031-07-r1',
      'XAL-2031-08-r1',
      'XDU-2031-06-r1',
      'XDU-2031-07-r1',
      'XES-2031-06-r1',
      'XES-2031-07-r1',
    ]);
  });

  test('publishes Estavel fifteen minutes after seeding, with nobody doing anything', async () => {
    const second = NOW.getTime() + 15 * MINUTE;
    expect(await idsAt(new Date(second - 1000))).not.toContain('XES-2031-08-r1');
    expect(await idsAt(new Date(second))).toContain('XES-2031-08-r1');
  });

  test('has announced what is to come, the next month of every economy included', async () => {
    const coming = await upcoming(stage.runtime.db, { at: NOW });
    expect(coming.map(({ economyCode, period }) => `${economyCode} ${period}`)).toEqual([
      'XES 2031-08',
      'XDU 2031-08',
      'XAL 2031-09',
      'XES 2031-09',
      'XDU 2031-09',
    ]);
    expect(coming.every(({ announcedAt, reason }) => announcedAt < NOW && reason === '')).toBe(
      true,
    );
  });

  test('has a key to the API for its subscriber', async () => {
    const key = await keyVerifier(stage.runtime.db)(accounts.api_key, NOW);
    expect(key?.scopes).toEqual(['read', 'scenarios']);
    expect(key?.plan.name).toBe('open');
  });

  test('lets out no vintage before its release', async () => {
    const vintages = await stage.runtime.db.selectFrom('vintage').selectAll().execute();
    expect(vintages).toHaveLength(8);
    for (const { public_from, known_from, source_published_at } of vintages) {
      expect(source_published_at < known_from).toBe(true);
      expect(public_from! > known_from).toBe(true);
    }
  });

  test('computes the last two months under a second version, read before it is used', async () => {
    const used = await stage.runtime.db
      .selectFrom('release')
      .innerJoin('specification', 'specification.id', 'release.specification_id')
      .select(['release.id', 'specification.version', 'holds_from'])
      .select(['specification.approved_at', 'specification.created_at', 'release.created_at as at'])
      .execute();
    expect(Object.fromEntries(used.map(({ id, version }) => [id, version]))).toEqual({
      'XAL-2031-06-r1': 1,
      'XAL-2031-07-r1': 2,
      'XAL-2031-08-r1': 2,
      'XDU-2031-06-r1': 1,
      'XDU-2031-07-r1': 1,
      'XES-2031-06-r1': 1,
      'XES-2031-07-r1': 2,
      'XES-2031-08-r1': 2,
    });
    for (const { version, holds_from, created_at, approved_at, at } of used) {
      expect(holds_from).toBe(version === 1 ? '2031-06' : '2031-07');
      expect(created_at < approved_at! && approved_at! < at).toBe(true);
    }
  });

  test('draws each page in force or coming once, for the instant it counts from', async () => {
    const { db, store, build } = stage.runtime;
    const pages = await currentRows(db, NOW);
    const drawn = pages.filter(({ headers }) => headers['content-type']?.startsWith('text/html'));
    expect(drawn.map(({ address }) => address)).toContain('/economies/XES/');
    expect(drawn).toHaveLength(stage.drawn.length);
    for (const { address, visible_from, artefact_hash } of drawn) {
      const body = new TextDecoder().decode((await store.get(artefact_hash))!);
      expect(body).toBe(`${address} at ${visible_from.toISOString()}`);
    }
    expect(
      pages.some(({ headers }) => headers['content-type'] === 'application/octet-stream'),
    ).toBe(false);
    expect(await redraw({ ...contextFor(stage.runtime, SYSTEM), now: () => NOW, build })).toBe(0);
  });

  test('has every release approved by somebody who made no part of it', async () => {
    const releases = await stage.runtime.db.selectFrom('release').selectAll().execute();
    const parts = await stage.runtime.db.selectFrom('release_contributor').selectAll().execute();
    for (const { id, approved_by, created_by } of releases) {
      const makers = parts.filter((row) => row.release_id === id).map((row) => row.person_id);
      expect(makers).toContain(created_by);
      expect(makers).not.toContain(approved_by);
    }
  });

  test('tells in the audit trail that its clock was stepped, and nothing later than seeding', async () => {
    const rows = await stage.runtime.db.selectFrom('audit').selectAll().orderBy('id').execute();
    expect(rows.length).toBeGreaterThan(40);
    for (const row of rows) {
      expect(row.detail).toMatchObject({ clock: 'stepped' });
      expect(row.at <= NOW).toBe(true);
    }
    expect(rows.map(({ at }) => at)).toEqual(rows.map(({ at }) => at).toSorted((a, b) => +a - +b));
    expect((await verifyAudit(stage.runtime.db)).brokenAt).toBeNull();
  });

  test('says what it does', () => {
    expect(progress[0]).toBe('Seeding the demo: people');
    const releases = progress.filter((text) => / \w+ 2031 /.test(text));
    expect(releases.at(-1)).toMatch(/^Seeding the demo: .*, \w+ 2031 \(8 of 8\)$/);
    expect(progress.at(-1)).toMatch(/^Seeding the demo: pages \((\d+) of \1\)$/);
  });
});
