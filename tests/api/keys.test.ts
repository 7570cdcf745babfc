import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { pool } from '../../db/connection.ts';
import { createApi } from '../../api/app.ts';
import { createAuth } from '../../src/lib/auth.ts';
import type { Mailer } from '../../src/lib/mail.ts';
import { ServiceError } from '../../src/lib/services/context.ts';
import { createKey } from '../../src/lib/services/keys/create.ts';
import { createLimits } from '../../src/lib/services/keys/limits.ts';
import { listKeys } from '../../src/lib/services/keys/list.ts';
import { revokeKey } from '../../src/lib/services/keys/revoke.ts';
import { keyVerifier } from '../../src/lib/services/keys/verify.ts';
import { ask, openScene, type Scene } from './scene.ts';

let scene: Scene;
beforeAll(async () => {
  scene = await openScene();
});
afterAll(() => scene.desk.close());

const kindOf = (error: unknown) => (error instanceof ServiceError ? error.kind : error);

describe('a key', () => {
  it('is shown once, kept as a hash and told of in the audit trail without either', async () => {
    const { id, plain } = await scene.makeKey(['read']);
    expect(plain).toMatch(/^slackwater_[A-Za-z0-9]{48}$/);
    const { db } = scene.desk;
    const row = await db
      .selectFrom('api_key')
      .selectAll()
      .where('id', '=', id)
      .executeTakeFirstOrThrow();
    expect(JSON.stringify(row)).not.toContain(plain);
    expect(row.start).toBe(plain.slice(0, 15));
    expect(row.plan).toBe('open');
    const audit = await db.selectFrom('audit').selectAll().orderBy('id').execute();
    expect(await scene.desk.trail(`key ${id}`)).toEqual(['key.created']);
    expect(JSON.stringify(audit)).not.toContain(row.key);
    expect(JSON.stringify(audit)).not.toContain(plain);
  });

  it('is one that the key plugin itself accepts', async () => {
    const { id, plain } = await scene.makeKey(['read']);
    const shared = pool(scene.desk.url, 2);
    const auth = createAuth({
      pool: shared,
      env: { publicUrl: 'http://127.0.0.1:1', secret: 'x'.repeat(32) },
      mail: { send: async () => {}, close: async () => {} } as unknown as Mailer,
    });
    const { valid, key } = await auth.api.verifyApiKey({ body: { key: plain } });
    await shared.end();
    expect(valid).toBe(true);
    expect(key).toMatchObject({ id, permissions: { api: ['read'] } });
  });

  it('is refused within a second of being revoked, in every process', async () => {
    const { id, plain } = await scene.makeKey(['read']);
    const other = createApi(scene.runtime);
    const status = async () =>
      Promise.all([scene.api, other].map(async (api) => (await ask(api, '/me', plain)).status));
    expect(await status()).toEqual([200, 200]);
    await revokeKey(scene.desk.as('subscriber'), id);
    await sleep(1_000);
    expect(await status()).toEqual([401, 401]);
    expect(await scene.desk.trail(`key ${id}`)).toEqual(['key.created', 'key.revoked']);
  });

  it('ends with its time and with its owner’s account', async () => {
    const { id, plain } = await scene.makeKey(['read']);
    const verify = () => keyVerifier(scene.desk.db)(plain, scene.runtime.clock.now());
    const { db, actors } = scene.desk;
    expect(await verify()).not.toBeNull();
    const change = db.updateTable('api_key').where('id', '=', id);
    await change.set({ expires_at: scene.runtime.clock.now() }).execute();
    expect(await verify()).toBeNull();
    await change.set({ expires_at: null }).execute();
    const account = db.updateTable('person').where('id', '=', actors.subscriber.id);
    await account.set({ banned: true }).execute();
    expect(await verify()).toBeNull();
    await account.set({ banned: false }).execute();
    expect(await verify()).not.toBeNull();
  });

  it('needs a name and something it may do', async () => {
    const ctx = scene.desk.as('subscriber');
    const faults = await createKey(ctx, { name: ' ', scopes: [] }).catch(
      (error: ServiceError) => error.faults,
    );
    expect(faults).toMatchObject([{ field: 'name' }, { field: 'scopes' }]);
  });
});

describe('the keys of a person', () => {
  it('are seen by that person alone, and revoked by an administrator too', async () => {
    const { id } = await scene.makeKey(['read']);
    const ids = async (who: Parameters<typeof scene.desk.as>[0]) =>
      (await listKeys(scene.desk.as(who))).map((key) => key.id);
    expect(await ids('subscriber')).toContain(id);
    for (const who of ['editor', 'reviewer', 'administrator'] as const) {
      expect(await ids(who)).not.toContain(id);
    }
    expect(await revokeKey(scene.desk.as('editor'), id).catch(kindOf)).toBe('not_found');
    await revokeKey(scene.desk.as('administrator'), id);
    expect(await ids('subscriber')).not.toContain(id);
    expect(await revokeKey(scene.desk.as('subscriber'), id).catch(kindOf)).toBe('not_found');
    const nobody = scene.desk.product;
    expect(await createKey(nobody, { name: 'x', scopes: ['read'] }).catch(kindOf)).toBe(
      'forbidden',
    );
  });
});

describe('a limit', () => {
  const times = <T>(count: number, call: () => Promise<T>) =>
    Promise.all(Array.from({ length: count }, call));

  it('holds across processes but for one second’s calls, and says when to come again', async () => {
    const { plain } = await scene.makeKey(['read']);
    const other = createApi(scene.runtime);
    scene.setClock('2031-10-05T12:00:10Z');
    const both = [scene.api, other];
    const first = await Promise.all(
      both.map((api) => times(30, async () => (await ask(api, '/me', plain)).status)),
    );
    expect(first.flat().every((status) => status === 200)).toBe(true);
    await sleep(2_200);
    for (const api of both) {
      const refused = await ask(api, '/me', plain);
      expect(refused.status).toBe(429);
      expect(refused.headers.get('retry-after')).toBe('50');
      expect(refused.headers.get('ratelimit-policy')).toBe(
        '"minute";q=60;w=60, "month";q=20000;w=2678400',
      );
      expect(refused.headers.get('ratelimit')).toMatch(/^"minute";r=0;t=50, "month";r=19940;/);
      expect(await refused.json()).toMatchObject({ 'violated-policies': ['minute'] });
    }
    scene.setClock('2031-10-05T12:01:00Z');
    const later = await ask(scene.api, '/me', plain);
    expect(later.status).toBe(200);
    expect(await later.json()).toMatchObject({
      plan: 'open',
      limits: [
        { span: 'minute', limit: 60, used: 1, resets_at: '2031-10-05T12:02:00.000Z' },
        { span: 'month', limit: 20_000, used: 61 },
      ],
    });
  });

  it('counts no call beyond it, and tells what was used', async () => {
    const { plain, id } = await scene.makeKey(['read']);
    const { db } = scene.desk;
    const key = (await keyVerifier(db)(plain, scene.runtime.clock.now()))!;
    const limits = createLimits(db, () => {});
    const now = new Date('2031-10-05T13:00:00Z');
    const charges = await times(70, () => limits.charge(key, now));
    expect(charges.filter((charge) => charge.exceeded.length === 0)).toHaveLength(60);
    await charges[0]!.refund();
    await charges[0]!.refund();
    expect((await limits.charge(key, now)).exceeded).toEqual([]);
    expect((await limits.charge(key, now)).exceeded).toHaveLength(1);
    await limits.settle();
    const usage = await db
      .selectFrom('key_usage')
      .select(['span', 'calls'])
      .where('key_id', '=', id)
      .orderBy('span')
      .execute();
    expect(usage).toEqual([
      { span: 'minute', calls: 60 },
      { span: 'month', calls: 60 },
    ]);
    const [listed] = await listKeys(scene.desk.as('subscriber'));
    expect(listed).toMatchObject({ id, callsThisMonth: 60, lastUsedAt: now });
  });

  it('follows the plan in the database', async () => {
    const { plain } = await scene.makeKey(['read']);
    const { db } = scene.desk;
    await db.updateTable('plan').set({ per_minute: 1 }).where('name', '=', 'open').execute();
    expect((await ask(scene.api, '/me', plain)).status).toBe(200);
    expect((await ask(scene.api, '/me', plain)).status).toBe(429);
    await db.updateTable('plan').set({ per_minute: 60 }).where('name', '=', 'open').execute();
  });

  it('takes over what other processes have counted', async () => {
    const { plain } = await scene.makeKey(['read']);
    const { db } = scene.desk;
    const key = (await keyVerifier(db)(plain, scene.runtime.clock.now()))!;
    const limits = createLimits(db, () => {});
    const now = new Date('2031-10-05T14:00:00Z');
    await limits.charge(key, now);
    await db.updateTable('key_usage').set({ calls: 5 }).where('key_id', '=', key.id).execute();
    await limits.settle();
    const { allowances } = await limits.charge(key, now);
    expect(allowances[0]?.remaining).toBe(60 - 5 - 1 - 1);
  });
});
