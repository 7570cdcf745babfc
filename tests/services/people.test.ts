import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { pool as connectPool } from '../../db/connection.ts';
import { type Auth, actorOf, ask, confirmAddress, createAuth } from '../../src/lib/auth.ts';
import type { Message } from '../../src/lib/mail.ts';
import { createPerson } from '../../src/lib/services/people/create.ts';
import { getProfile } from '../../src/lib/services/people/profile.ts';
import { renameSelf } from '../../src/lib/services/people/rename.ts';
import { setRole } from '../../src/lib/services/people/setRole.ts';
import { signUp } from '../../src/lib/services/people/signUp.ts';
import { type Desk, openDesk, PASSWORD } from './desk.ts';

let desk: Desk;
let auth: Auth;
let pool: ReturnType<typeof connectPool>;
let mails: Message[] = [];
beforeAll(async () => {
  desk = await openDesk();
  pool = connectPool(desk.url, 4);
  const mail = {
    send: async (message: Message) => void mails.push(message),
    close: async () => {},
  };
  const env = { publicUrl: 'http://127.0.0.1:4321', secret: 'k3Jd92ls0f8Gh1qPzXw7Rt5vBn4mYc6E' };
  auth = createAuth({ pool, env, mail });
});
afterAll(async () => {
  await pool.end();
  await desk.close();
});
beforeEach(() => {
  mails = [];
});

// Each test comes from an address of its own, so that none spends another's attempts.
let last = 0;
const client = (cookie = '') => ({
  address: `192.0.2.${(last += 1)}`,
  headers: new Headers(cookie ? { cookie } : {}),
});

const signIn = (email: string, password = PASSWORD, from = client()) =>
  ask(auth, from, '/sign-in/email', { email, password });

function headersOf(cookies: string[]): Headers {
  return new Headers({ cookie: cookies.map((cookie) => cookie.split(';')[0]).join('; ') });
}

describe('signing in', () => {
  test('by e-mail and password makes the person known, until signing out', async () => {
    const { ok, cookies } = await signIn('reviewer@example.org');
    expect(ok).toBe(true);
    expect(cookies.join()).toMatch(/HttpOnly/i);
    expect(cookies.join()).toMatch(/SameSite=Lax/i);
    const headers = headersOf(cookies);
    expect(await actorOf(auth, headers)).toEqual(desk.actors.reviewer);
    const out = await ask(auth, { address: '192.0.2.250', headers }, '/sign-out', {});
    expect(out.ok).toBe(true);
    expect(await actorOf(auth, headers)).toBeNull();
  });

  test('is refused in the same words for a wrong password and for an unknown address', async () => {
    const wrong = await signIn('reviewer@example.org', 'not the password at all');
    const unknown = await signIn('nobody@example.org');
    expect(wrong).toMatchObject({ ok: false, status: 401 });
    expect(unknown).toEqual(wrong);
  });

  test('is limited: many wrong passwords from one address meet a wall', async () => {
    const from = client();
    const statuses: number[] = [];
    for (let i = 0; i < 11; i += 1) {
      statuses.push((await signIn('editor@example.org', `wrong password ${i}`, from)).status);
    }
    expect(statuses.slice(0, 10)).toEqual(Array(10).fill(401));
    expect(statuses[10]).toBe(429);
  });

  test('a closed account is nobody, its open sessions too', async () => {
    const email = 'closed@example.org';
    const id = await createPerson(desk.as('administrator'), {
      name: 'Closed',
      email,
      role: 'editor',
      password: PASSWORD,
    });
    const headers = headersOf((await signIn(email)).cookies);
    expect(await actorOf(auth, headers)).not.toBeNull();
    await desk.db.updateTable('person').set({ banned: true }).where('id', '=', id).execute();
    expect(await actorOf(auth, headers)).toBeNull();
    expect((await signIn(email)).ok).toBe(false);
  });
});

describe('signing up', () => {
  test('makes a subscriber who can sign in once the address is confirmed', async () => {
    const email = 'analyst@example.org';
    await signUp(desk.product, auth, client(), {
      name: 'Analyst',
      email: 'Analyst@Example.org',
      password: PASSWORD,
    });
    expect(mails.map(({ to }) => to)).toEqual([email]);
    expect(await signIn(email)).toMatchObject({ ok: false, code: 'EMAIL_NOT_VERIFIED' });
    const token = /token=(\S+)/.exec(mails[0]!.text)?.[1] ?? '';
    expect(await confirmAddress(auth, `${token}x`)).toBe(false);
    expect(await confirmAddress(auth, token)).toBe(true);
    const actor = await actorOf(auth, headersOf((await signIn(email)).cookies));
    expect(actor).toMatchObject({ role: 'subscriber', name: 'Analyst' });
    expect(await desk.trail(`person ${actor?.id}`)).toEqual(['person.signed_up']);
  });

  test('with an address that has an account changes nothing and says nothing', async () => {
    const again = { name: 'Other', email: 'editor@example.org', password: 'another password here' };
    await signUp(desk.product, auth, client(), again);
    expect(mails).toEqual([]);
    expect((await signIn('editor@example.org')).ok).toBe(true);
    expect((await signIn('editor@example.org', again.password)).ok).toBe(false);
  });

  test('names each field that needs another look', async () => {
    const wrong = { name: ' ', email: 'nowhere', password: 'short' };
    await expect(signUp(desk.product, auth, client(), wrong)).rejects.toMatchObject({
      faults: [{ field: 'name' }, { field: 'email' }, { field: 'password' }],
    });
  });

  test('is limited: ten an hour from one address, and the next makes no account', async () => {
    const from = client();
    const person = (i: number) => ({
      name: 'Many',
      email: `many${i}@example.org`,
      password: PASSWORD,
    });
    for (let i = 0; i < 10; i += 1) await signUp(desk.product, auth, from, person(i));
    await expect(signUp(desk.product, auth, from, person(10))).rejects.toMatchObject({
      kind: 'forbidden',
      message: expect.stringMatching(/No account was made; try again in \d+ minutes\./),
    });
    const made = await desk.db
      .selectFrom('person')
      .select('email')
      .where('name', '=', 'Many')
      .execute();
    expect(made).toHaveLength(10);
    await signUp(desk.product, auth, client(), person(10));
  });

  test('is not possible past the service', async () => {
    const sent = { name: 'X', email: 'x@example.org', password: PASSWORD, role: 'administrator' };
    expect((await ask(auth, client(), '/sign-up/email', sent)).ok).toBe(false);
  });
});

describe('a forgotten password', () => {
  test('is replaced by a mailed link, once, and ends other sessions', async () => {
    const email = 'forgetful@example.org';
    await createPerson(desk.as('administrator'), {
      name: 'Forgetful',
      email,
      role: 'subscriber',
      password: PASSWORD,
    });
    const headers = headersOf((await signIn(email)).cookies);
    await ask(auth, client(), '/request-password-reset', { email });
    const token = /token=(\S+)/.exec(mails[0]!.text)?.[1];
    const newPassword = 'a quite different password';
    const reset = () => ask(auth, client(), '/reset-password', { token, newPassword });
    expect((await reset()).ok).toBe(true);
    expect((await reset()).ok).toBe(false);
    expect(await actorOf(auth, headers)).toBeNull();
    expect((await signIn(email, newPassword)).ok).toBe(true);
  });

  test('of nobody sends nothing', async () => {
    await ask(auth, client(), '/request-password-reset', { email: 'nobody@example.org' });
    expect(mails).toEqual([]);
  });
});

describe('a profile', () => {
  test('has a name that its person changes, recorded once', async () => {
    await renameSelf(desk.as('otherEditor'), { name: 'Second editor' });
    await renameSelf(desk.as('otherEditor'), { name: 'Second editor' });
    const profile = await getProfile(desk.as('otherEditor'));
    expect(profile).toMatchObject({ name: 'Second editor', email: 'othereditor@example.org' });
    const trail = await desk.trail(`person ${desk.actors.otherEditor.id}`);
    expect(trail).toEqual(['person.created', 'person.renamed']);
  });
});

describe('roles', () => {
  test('are set by an administrator, and end the sessions of the old role', async () => {
    const headers = headersOf((await signIn('subscriber@example.org')).cookies);
    const personId = desk.actors.subscriber.id;
    await setRole(desk.as('administrator'), { personId, role: 'editor' });
    expect(await actorOf(auth, headers)).toBeNull();
    const again = headersOf((await signIn('subscriber@example.org')).cookies);
    expect(await actorOf(auth, again)).toMatchObject({ role: 'editor' });
  });

  test('are changed by nobody for themselves, in no way', async () => {
    const { administrator } = desk.actors;
    await expect(
      setRole(desk.as('administrator'), { personId: administrator.id, role: 'reviewer' }),
    ).rejects.toMatchObject({ kind: 'forbidden' });
    const { cookies } = await signIn('administrator@example.org');
    const from = { address: '192.0.2.251', headers: headersOf(cookies) };
    const past: [string, Record<string, unknown>][] = [
      ['/update-user', { role: 'editor' }],
      ['/admin/set-role', { userId: administrator.id, role: 'editor' }],
      ['/admin/update-user', { userId: administrator.id, data: { role: 'editor' } }],
    ];
    for (const [path, body] of past) {
      expect([path, (await ask(auth, from, path, body)).ok]).toEqual([path, false]);
    }
    expect(await actorOf(auth, from.headers)).toMatchObject({ role: 'administrator' });
  });

  test('an address has one account', async () => {
    await expect(
      createPerson(desk.as('administrator'), {
        name: 'Twice',
        email: 'Editor@example.org',
        role: 'editor',
        password: PASSWORD,
      }),
    ).rejects.toMatchObject({ kind: 'conflict', faults: [{ field: 'email' }] });
  });
});

describe('keys of the API', () => {
  test('are issued once in plain text and kept as a hash', async () => {
    const { key, id } = await auth.api.createApiKey({
      body: { name: 'Notebook', userId: desk.actors.editor.id },
    });
    expect(key).toMatch(/^slackwater_/);
    const row = await desk.db
      .selectFrom('api_key')
      .select(['key', 'start', 'person_id'])
      .where('id', '=', id)
      .executeTakeFirstOrThrow();
    expect(row.key).not.toContain(key.slice(11));
    expect(row).toMatchObject({ start: key.slice(0, 15), person_id: desk.actors.editor.id });
  });
});
