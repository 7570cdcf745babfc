import { sql } from 'kysely';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { COMING_SECOND, FIRST_SECOND, NOW, openScene, SECOND_SECOND, type Scene } from './scene.ts';

interface Row {
  period: string;
  value: number | null;
  status: string;
  release: string;
  published_at: string;
}

let scene: Scene;
beforeAll(async () => {
  scene = await openScene();
});
afterAll(() => scene.desk.close());

async function rowsOf(path: string): Promise<Row[]> {
  const response = await scene.get(path);
  expect(response.status).toBe(200);
  return ((await response.json()) as { data: Row[] }).data;
}
const observations = (id: string, query = '') => rowsOf(`/series/${id}/observations${query}`);
const justBefore = (at: string) => new Date(Date.parse(at) - 1).toISOString();

describe('a release under embargo', () => {
  const SEEN = [
    '/economies',
    '/economies/XTB',
    '/series?economy=XTB',
    '/series/XTB.implied_gap.M',
    '/series/XTB.implied_gap.M/observations',
    '/series/XTB.prices.M/observations',
    '/releases',
    '/calendar',
  ];

  it('changes nothing before its second but that it is announced', async () => {
    scene.setClock(NOW);
    const before = await Promise.all(SEEN.map((path) => scene.get(path)));
    scene.setClock(justBefore(COMING_SECOND));
    const last = await Promise.all(SEEN.map((path) => scene.get(path)));
    expect(last.map((response) => response.headers.get('etag'))).toEqual(
      before.map((response) => response.headers.get('etag')),
    );
    const told = (await Promise.all(last.map((response) => response.text()))).join('\n');
    expect(told).not.toContain('XTB-2030-12');
    expect(told).not.toContain('XTB 2030-12 is out');
    expect((await scene.get('/releases/XTB-2030-12-r1')).status).toBe(404);
    expect((await scene.get('/releases/XTD-2030-12-r1')).status).toBe(404);
    expect((await scene.get('/economies/XTD')).status).toBe(404);
    expect((await scene.get('/series/XTD.money.M')).status).toBe(404);
  });

  it('stands everywhere at its second', async () => {
    scene.setClock(COMING_SECOND);
    const told = await Promise.all(
      SEEN.slice(0, -1).map(async (path) => (await scene.get(path)).text()),
    );
    for (const text of told) expect(text).toContain('XTB-2030-12-r1');
    expect((await scene.get('/releases/XTB-2030-12-r1')).status).toBe(200);
  });

  it('waits where its pages are not ready at its second', async () => {
    scene.setClock(COMING_SECOND);
    const { db } = scene.desk;
    const change = db.updateTable('release').where('id', '=', 'XTB-2030-12-r1');
    await change.set({ ready_for: null }).execute();
    expect((await scene.get('/releases/XTB-2030-12-r1')).status).toBe(404);
    const prices = await observations('XTB.prices.M');
    expect(prices.at(-1)?.period).toBe('2030-11');
    await change.set({ ready_for: new Date(COMING_SECOND) }).execute();
    scene.setClock(COMING_SECOND);
  });
});

describe('as_of', () => {
  const surprise = (query = '') => observations('XTA.money_surprise.M', query);

  it('answers what was public at that instant', async () => {
    expect(await surprise(`?as_of=${justBefore(FIRST_SECOND)}`)).toEqual([]);
    const first = await surprise(`?as_of=${FIRST_SECOND}`);
    expect(first.at(-1)).toMatchObject({
      period: '2030-11',
      release: 'XTA-2030-11-r1',
      published_at: FIRST_SECOND,
    });
    expect(await surprise(`?as_of=${justBefore(SECOND_SECOND)}`)).toEqual(first);
    const second = await surprise(`?as_of=${SECOND_SECOND}`);
    expect(second.at(-1)).toMatchObject({ period: '2030-12', release: 'XTA-2030-12-r1' });
    expect(new Set(second.map((row) => row.release))).toEqual(new Set(['XTA-2030-12-r1']));
    expect(await surprise()).toEqual(second);
  });

  it('takes a date as the end of that day of UTC', async () => {
    const ofDay = await surprise('?as_of=2031-10-01');
    expect(ofDay).toEqual(await surprise(`?as_of=${justBefore('2031-10-02T00:00:00Z')}`));
    expect(ofDay.at(-1)?.release).toBe('XTA-2030-11-r1');
    expect(await surprise('?as_of=2031-09-30')).toEqual([]);
  });

  it('takes an offset', async () => {
    const query = `?as_of=${encodeURIComponent('2031-10-01T10:00:00+02:00')}`;
    expect(await surprise(query)).toEqual(await surprise(`?as_of=${FIRST_SECOND}`));
  });

  it('never reaches past now', async () => {
    scene.setClock('2031-10-09T09:00:00Z');
    const today = await surprise('?as_of=2031-10-09');
    expect(today).toEqual(await surprise());
    expect((await scene.get('/series/XTA.money.M/observations?as_of=2031-10-10')).status).toBe(400);
  });

  it('answers an input series as it was public, from the vintage of the latest source', async () => {
    const money = (query = '') => observations('XTA.money.M', query);
    expect(await money(`?as_of=${justBefore(FIRST_SECOND)}`)).toEqual([]);
    const first = await money(`?as_of=${FIRST_SECOND}`);
    expect(first.at(-1)).toMatchObject({ period: '2030-11', published_at: FIRST_SECOND });
    const second = await money();
    expect(second.find((row) => row.period === '2030-11')?.value).toBe(160.1);
    expect(first.at(-1)?.value).not.toBe(160.1);
    expect(second.at(-1)).toMatchObject({ period: '2030-12', release: 'XTA-2030-12-r1' });
  });
});

describe('concepts', () => {
  it('keep each month as it was first published', async () => {
    const first = await observations('XTA.money_surprise_first.M');
    expect(first.map(({ period, release }) => [period, release])).toEqual([
      ['2030-11', 'XTA-2030-11-r1'],
      ['2030-12', 'XTA-2030-12-r1'],
    ]);
    const then = await observations('XTA.money_surprise.M', `?as_of=${FIRST_SECOND}`);
    expect(first[0]?.value).toBe(then.at(-1)?.value);
  });

  it('call it an output effect without persistence, and a gap with it', async () => {
    const conceptsOf = async (economy: string) =>
      (
        (await (await scene.get(`/series?economy=${economy}`)).json()) as {
          data: { concept: string }[];
        }
      ).data.map(({ concept }) => concept);
    expect(await conceptsOf('XTA')).toContain('output_effect_lower');
    expect(await conceptsOf('XTA')).not.toContain('implied_gap');
    expect(await conceptsOf('XTB')).toContain('implied_gap_lower');
    expect(await conceptsOf('XTB')).not.toContain('output_effect');
  });

  it('mark a gap as an assumption, without ends, where the model is rejected', async () => {
    // A published value never changes, so the trigger that says so is off while a rejected model is put in its place.
    await scene.desk.db.transaction().execute(async (trx) => {
      await sql`alter table release_value disable trigger user`.execute(trx);
      await trx
        .deleteFrom('release_value')
        .where('release_id', '=', 'XTB-2030-12-r1')
        .where('indicator', '=', 'implied_gap')
        .execute();
      await trx
        .insertInto('release_value')
        .values({
          release_id: 'XTB-2030-12-r1',
          indicator: 'implied_gap',
          period: '2030-12',
          value: 0.5,
          lower: null,
          upper: null,
        })
        .execute();
      await sql`alter table release_value enable trigger user`.execute(trx);
    });
    for (const [concept, value] of [
      ['implied_gap', 0.5],
      ['implied_gap_lower', null],
      ['implied_gap_upper', null],
    ] as const) {
      const [row] = await observations(`XTB.${concept}.M`);
      expect(row).toMatchObject({ value, status: 'assumption' });
    }
  });

  it('are cut by from and to', async () => {
    const all = await observations('XTA.inflation.M');
    const some = await observations('XTA.inflation.M', '?from=2029-03&to=2029-05');
    expect(some.map(({ period }) => period)).toEqual(['2029-03', '2029-04', '2029-05']);
    expect(all).toEqual(expect.arrayContaining(some));
  });
});
