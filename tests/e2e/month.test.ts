import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { sql } from 'kysely';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DemoAccounts } from '../../seed/accounts.ts';
import { gapFigure, growthSize, surpriseFigure } from '../../src/lib/charts/figures.ts';
import { ENTRY } from '../../src/commands/build.mjs';
import { ROOT } from '../../src/commands/run.mjs';
import type { ComputeResult } from '../../src/lib/econ/types.ts';
import { readEnv } from '../../src/lib/env.ts';
import { startPool } from '../../src/lib/publication/pool.ts';
import { type TestBrowser, startBrowser } from '../setup/browser.ts';
import { type TestDatabase, testDatabase } from '../setup/database.ts';
import { type TestServer, startServer } from '../setup/server.ts';

const REFERENCE = new URL('../reference/', import.meta.url);
const CASE = 'us-random-walk-fixed-with-error-persistent';
const PERIOD = '2000-Q4';
const RELEASE = `/releases/XQU/${PERIOD}/`;
const IMAGE = `/images/XQU/${PERIOD}/r1/surprise-wide.png`;
const CSV = '/data/XQU.money_surprise.Q.csv';
const OBSERVATIONS = '/api/v1/series/XQU.money_surprise.Q/observations';
const GATE =
  'Prices in Quarterland do not behave as the model requires; the gap is an assumption, not an estimate.';

let database: TestDatabase;
let folder: string;
let servers: TestServer[];
let browser: TestBrowser;
let accounts: DemoAccounts;
let editor: Page;
let reviewer: Page;

beforeAll(async () => {
  database = await testDatabase();
  folder = await mkdtemp(join(tmpdir(), 'slackwater-month-'));
  const options = {
    databaseUrl: database.url,
    dataDir: folder,
    seed: { economies: ['XAL'], months: 2 },
  };
  const first = await startServer(options);
  // Both are one site: they share its public address, as processes behind one proxy do.
  const env = { SLACKWATER_PUBLIC_URL: first.url };
  servers = [first, await startServer({ ...options, env })];
  accounts = JSON.parse(await readFile(join(folder, 'demo-accounts.json'), 'utf8')) as DemoAccounts;
  browser = await startBrowser();
  editor = await signIn('editor');
  reviewer = await signIn('reviewer');
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await Promise.all((servers ?? []).map((server) => server.stop()));
  await database?.drop();
  await rm(folder, { recursive: true, force: true });
});

async function signIn(role: string): Promise<Page> {
  const account = accounts.accounts.find((one) => one.role === role)!;
  const page = await browser.open({ baseURL: servers[0]!.url });
  await page.goto('/desk/');
  await page.getByLabel('E-mail address').fill(account.email);
  await page.getByLabel('Password').fill(account.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL('**/desk/');
  return page;
}

async function reference(): Promise<ComputeResult> {
  const text = await readFile(new URL(`cases/${CASE}.json`, REFERENCE), 'utf8');
  return (JSON.parse(text) as { expected: ComputeResult }).expected;
}

/** What every process answers at an address now: its status, and its body where it is there. */
async function everywhere(path: string): Promise<{ status: number; body: string }[]> {
  return Promise.all(
    servers.map(async ({ url }) => {
      const headers: Record<string, string> = path.startsWith('/api/')
        ? { authorization: `Bearer ${accounts.api_key}` }
        : {};
      const response = await fetch(url + path, { headers });
      return { status: response.status, body: await response.text() };
    }),
  );
}

async function statuses(path: string): Promise<number[]> {
  return (await everywhere(path)).map((answer) => answer.status);
}

describe('the whole way of one figure', () => {
  it('an editor creates an economy, loads its data and drafts a specification', async () => {
    await editor.goto('/desk/economies/new/');
    await editor.getByLabel('Code').fill('XQU');
    await editor.getByLabel('Name', { exact: true }).fill('Quarterland');
    await editor.getByLabel('Currency').fill('quarter crown');
    await editor.getByLabel('Frequency').selectOption('quarterly');
    await editor.getByLabel('Desk contact').fill('Slackwater desk, desk@example.org');
    for (const concept of ['money', 'prices', 'activity']) {
      const field = (name: string) => editor.locator(`[name="series.${concept}.${name}"]`);
      if (concept !== 'money') await field('present').check();
      await field('title').fill(`Test ${concept}`);
      await field('unit').fill('index');
      await field('timing').selectOption(concept === 'money' ? 'end' : 'average');
      await field('adjustment').selectOption('adjusted');
      await field('source').fill('Table F5.1 of Greene (2003)');
      await field('licence').fill('Facts');
    }
    await editor.getByRole('button', { name: 'Create the economy' }).click();
    await editor.waitForURL('**/desk/economies/?done=created');

    await editor.goto('/desk/data/?economy=XQU');
    const file = new URL('datasets/us-greene-quarterly.csv', REFERENCE);
    await editor.getByLabel('File').setInputFiles(file.pathname);
    await editor.getByLabel('Published by the source at (UTC)').fill('2001-01-30T08:30:00');
    await editor.getByRole('button', { name: 'Load the vintage' }).click();
    await editor.waitForURL('**/desk/data/?done=loaded');

    await editor.goto('/desk/specifications/new/?economy=XQU');
    await editor.getByLabel('Holds from').fill('2000-Q1');
    await editor.getByLabel('Why').fill('First version.');
    await editor.getByLabel('Rule').selectOption('random_walk');
    await editor.getByLabel('Order', { exact: true }).fill('');
    await editor.getByLabel('Window', { exact: true }).selectOption('expanding');
    await editor.getByLabel('Window length').fill('40');
    await editor.getByLabel('Where it comes from').selectOption('fixed');
    await editor.getByLabel('Slope b').fill('0.5');
    await editor.getByLabel('Standard error of the output share').fill('0.08');
    await editor.getByLabel('Persistence').fill('0.6');
    await editor.getByLabel('Confidence of the band').fill('0.8');
    await editor.getByRole('button', { name: 'Save the specification' }).click();
    await editor.waitForURL('**/desk/specifications/?done=drafted');

    await reviewer.goto('/desk/specifications/');
    await reviewer.getByRole('button', { name: /Approve version 1 of Quarterland/ }).click();
    await reviewer.waitForURL('**/desk/specifications/?done=approved');
  });

  it('computes, writes and submits a release, and cannot approve it', async () => {
    await editor.goto('/desk/releases/new/?economy=XQU');
    await editor.getByLabel('Reference period').fill(PERIOD);
    await editor.getByRole('button', { name: /draft/i }).click();
    await editor.waitForURL('**/desk/releases/XQU-2000-Q4-r1/**');
    await editor.getByLabel('Headline').fill('Quarterland’s money fell short of expectation');
    await editor
      .getByLabel('Explainer')
      .fill('Money fell short of what was expected. Prices do not behave as the model requires.');
    await editor.getByRole('button', { name: 'Save and compute' }).click();
    await editor.waitForURL('**?done=compute');
    await editor.getByRole('button', { name: 'Save and submit for review' }).click();
    await editor.waitForURL('**?done=submit');
    const approve = editor.getByRole('button', { name: /^Approve/ });
    expect(await approve.isDisabled()).toBe(true);

    // Not by the page alone: the verb itself refuses.
    const refused = await editor.request.post('/desk/releases/XQU-2000-Q4-r1/', {
      form: { step: 'approve', version: '3' },
      headers: { origin: servers[0]!.url },
    });
    expect(refused.status()).toBe(403);
  });

  it('shows nothing before its second, and everything from it, in both processes', async () => {
    await reviewer.goto('/desk/releases/XQU-2000-Q4-r1/');
    await reviewer.getByRole('button', { name: /^Approve/ }).click();
    await reviewer.waitForURL('**?done=approve');
    const second = new Date(Math.ceil(Date.now() / 1000) * 1000 + 10_000);
    await reviewer.getByLabel('Published at (UTC)').fill(second.toISOString().slice(0, 19));
    await reviewer.getByRole('button', { name: /^Schedule/ }).click();
    await reviewer.waitForURL('**?done=schedule');

    while (Date.now() < second.getTime() - 500) {
      for (const path of [RELEASE, `${RELEASE}r1/`, IMAGE, CSV]) {
        expect(await statuses(path), path).toEqual([404, 404]);
      }
      for (const { status, body } of await everywhere(OBSERVATIONS)) {
        expect(status === 404 || (JSON.parse(body) as { data: [] }).data.length === 0).toBe(true);
      }
      await sleep(400);
    }
    // The test's clock and the database's are the same machine's; the measured offset is within milliseconds.
    await sleep(second.getTime() - Date.now() + 50);
    for (const path of [RELEASE, `${RELEASE}r1/`, IMAGE, CSV, OBSERVATIONS]) {
      expect(await statuses(path), path).toEqual([200, 200]);
    }
  });
});

describe('what readers then see', () => {
  it('prints the reference case’s figures to the digit', async () => {
    const expected = await reference();
    const i = expected.periods.indexOf(PERIOD);
    const page = await browser.open({ baseURL: servers[1]!.url });
    await page.goto(RELEASE);
    const text = (await page.locator('main').innerText()).replaceAll('\u00a0', ' ');
    expect(text).toContain(surpriseFigure(expected.surprise[i]!));
    const [fell, growth] = [expected.growth, expected.expected_growth].map((d) =>
      growthSize(d[i]!),
    );
    expect(text).toContain(`Money fell ${fell}%; growth of ${growth}% was expected`);
    expect(text).toContain(gapFigure(expected.gap![i]!));
    expect(text).toContain(GATE);
    await page.close();
  });

  it('gives the API and the file the same numbers as the reference case', async () => {
    const expected = await reference();
    const [api] = await everywhere(OBSERVATIONS);
    const { data } = JSON.parse(api!.body) as { data: { period: string; value: number }[] };
    expect(data.map((row) => row.period)).toEqual(expected.periods);
    data.forEach(({ value }, i) => expect(value).toBeCloseTo(expected.surprise[i]!, 9));
    const [csv] = await everywhere(CSV);
    const last = csv!.body.trim().split('\r\n').at(-1)!.split(',');
    expect(last[0]).toBe(PERIOD);
    expect(Number(last[1])).toBe(data.at(-1)!.value);
  });

  it('leads the page of an economy whose prices behave with its gap and band', async () => {
    const page = await browser.open({ baseURL: servers[1]!.url });
    await page.goto('/economies/XAL/');
    await page
      .getByRole('link', { name: /Aldermark/ })
      .first()
      .click();
    const text = await page.locator('main').innerText();
    expect(text).not.toContain('do not behave as the model requires');
    expect(text).toMatch(/80% band [+−]\d\.\d to [+−]\d\.\d/);
    await page.close();
  });

  it('stores every page as the same route draws it on demand', async () => {
    const { rows } = await sql<{ address: string }>`
      select distinct address from published where build is not null and visible_from <= now()
    `.execute(database.db);
    const env = readEnv({
      SLACKWATER_MODE: 'demo',
      DATABASE_URL: database.url,
      SLACKWATER_DATA_DIR: folder,
      SLACKWATER_PUBLIC_URL: servers[0]!.url,
    });
    const pool = startPool({ entry: ENTRY, workerData: { env, root: ROOT }, threads: 1 });
    try {
      expect(rows.length).toBeGreaterThan(12);
      for (const { address } of rows) {
        // The address of the page for what is missing answers as any missing one.
        const [stored] = await everywhere(address);
        const drawn = await pool.page(address, { at: new Date() });
        expect(new TextDecoder().decode(drawn.body), address).toBe(stored!.body);
        expect(drawn.status, address).toBe(stored!.status);
      }
    } finally {
      await pool.close();
    }
  });

  it('has a share image with words for those who do not see it', async () => {
    const page = await browser.open({ baseURL: servers[1]!.url });
    await page.goto(RELEASE);
    const meta = (property: string) =>
      page.locator(`meta[property="${property}"]`).getAttribute('content');
    expect(await meta('og:image')).toMatch(/\/images\/XQU\/2000-Q4\/surprise-wide\.png$/);
    expect(await meta('og:image:alt')).toContain('Quarterland');
    const png = await page.request.get(IMAGE);
    expect(png.headers()['content-type']).toBe('image/png');
    await page.close();
  });
});
