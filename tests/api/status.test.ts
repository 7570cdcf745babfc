import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ask, openScene, type Scene } from './scene.ts';

let scene: Scene;
beforeAll(async () => {
  scene = await openScene();
});
afterAll(() => scene.desk.close());

const READS = [
  '/economies',
  '/economies/XTA',
  '/series',
  '/series/XTA.money_surprise.M',
  '/series/XTA.money_surprise.M/observations',
  '/releases',
  '/releases/XTA-2030-12-r1',
  '/calendar',
  '/me',
];
const LISTS = ['/economies', '/series', '/releases', '/calendar'];

/** Checks what every problem document has, and that nothing of the program shows in it. */
async function problemOf(response: Response, status: number) {
  expect(response.status).toBe(status);
  expect(response.headers.get('content-type')).toBe('application/problem+json');
  const text = await response.text();
  expect(text).not.toMatch(/\.ts:|node_modules|\\n +at /);
  const problem = JSON.parse(text) as {
    status: number;
    detail: string;
    errors?: { parameter?: string; pointer?: string; message: string }[];
  };
  expect(problem).toMatchObject({
    type: expect.any(String),
    title: expect.any(String),
    detail: expect.any(String),
    instance: `urn:uuid:${response.headers.get('x-request-id')}`,
    status,
  });
  return problem;
}

describe.each(READS)('GET %s', (path) => {
  it('answers JSON that a cache may keep and must ask again for', async () => {
    const response = await scene.get(path);
    expect(response.status).toBe(200);
    expect(response.headers.get('content-type')).toBe('application/json');
    expect(response.headers.get('cache-control')).toBe('private, no-cache');
    expect(response.headers.get('etag')).toMatch(/^"[\w-]{27}"$/);
    expect(response.headers.get('access-control-allow-origin')).toBe('*');
    expect(response.headers.get('ratelimit')).toMatch(
      /^"minute";r=\d+;t=\d+, "month";r=\d+;t=\d+$/,
    );
  });

  it('answers HEAD with the same headers and no body', async () => {
    const response = await ask(scene.api, path, scene.key, { method: 'HEAD' });
    expect(response.status).toBe(200);
    expect(response.headers.get('etag')).not.toBeNull();
    expect(await response.text()).toBe('');
  });

  it('asks for a key, and refuses a wrong one', async () => {
    const without = await ask(scene.api, path, null);
    expect(without.headers.get('www-authenticate')).toContain('Bearer');
    await problemOf(without, 401);
    await problemOf(await ask(scene.api, path, 'slackwater_wrong'), 401);
  });

  it('takes the key in a header of its own too', async () => {
    const headers = { 'x-api-key': scene.key };
    expect((await ask(scene.api, path, null, { headers })).status).toBe(200);
  });

  it('refuses a key without the scope', async () => {
    const { plain } = await scene.makeKey(['scenarios'], 'editor');
    await problemOf(await ask(scene.api, path, plain), 403);
  });

  it('names an unknown parameter', async () => {
    const problem = await problemOf(await scene.get(`${path}?colour=red`), 400);
    expect(problem.errors).toEqual([
      { parameter: 'colour', message: 'There is no parameter "colour" here.' },
    ]);
  });

  it('has no XML', async () => {
    await problemOf(await scene.get(path, { accept: 'application/xml' }), 406);
  });

  it('can only be read', async () => {
    const response = await ask(scene.api, path, scene.key, { method: 'DELETE' });
    expect(response.headers.get('allow')).toBe('GET, HEAD, OPTIONS');
    await problemOf(response, 405);
  });
});

describe.each(LISTS)('the pages of %s', (path) => {
  it('add up to the whole', async () => {
    const whole = (await (await scene.get(path)).json()) as { data: unknown[] };
    const found: unknown[] = [];
    let next: string | null = `${path}?limit=1`;
    while (next) {
      const response = await scene.get(next);
      found.push(...((await response.json()) as { data: unknown[] }).data);
      const link = /^<\/api\/v1([^>]+)>; rel="next"$/.exec(response.headers.get('link') ?? '');
      next = link?.[1] ?? null;
    }
    expect(found).toEqual(whole.data);
  });

  it.each(['0', '-1', '1.5', '1001', 'many', ''])('refuse a limit of %j', async (limit) => {
    const problem = await problemOf(await scene.get(`${path}?limit=${limit}`), 400);
    expect(problem.errors?.[0]?.parameter).toBe('limit');
  });

  it.each(['x', '%00', 'bnVsbA'])('refuse a cursor of %j', async (cursor) => {
    const problem = await problemOf(await scene.get(`${path}?cursor=${cursor}`), 400);
    expect(problem.errors?.[0]?.parameter).toBe('cursor');
  });

  it('refuse a parameter given twice', async () => {
    const problem = await problemOf(await scene.get(`${path}?limit=1&limit=2`), 400);
    expect(problem.errors).toEqual([{ parameter: 'limit', message: 'limit may be given once.' }]);
  });
});

describe('an address that is not there', () => {
  it.each([
    '/economies/xta',
    '/economies/%00',
    '/economies/XZZ',
    '/series/XTA.nothing.M',
    '/series/XTA.money_surprise.Q',
    '/series/..%2F..%2Fetc/observations',
    '/releases/XTA-2030-12-r9',
    '/releases/%F0%9F%98%80',
    '/nothing',
    '/economies/',
    '',
  ])('is a 404 at %j', async (path) => {
    await problemOf(await scene.get(path), 404);
  });

  it('is a 404 outside the version too', async () => {
    await problemOf(await Promise.resolve(scene.api.request('/api/v2/economies')), 404);
    await problemOf(await Promise.resolve(scene.api.request('/api')), 404);
  });
});

describe('observations', () => {
  const path = '/series/XTA.money_surprise.M/observations';
  it.each([
    ['from=2031', 'from'],
    ['to=2031-13', 'to'],
    ['from=2030-12&to=2030-01', 'from'],
    ['as_of=yesterday', 'as_of'],
    ['as_of=2031-02-30', 'as_of'],
    ['as_of=2031-10-06', 'as_of'],
    ['as_of=2031-10-05T12:00:01Z', 'as_of'],
    ['as_of=2031-10-05T13:00', 'as_of'],
    ['format=xml', 'format'],
  ])('refuse %s', async (query, parameter) => {
    const problem = await problemOf(await scene.get(`${path}?${query}`), 400);
    expect(problem.errors?.map((error) => error.parameter)).toEqual([parameter]);
  });

  it('keep values whose licence allows no copies', async () => {
    await problemOf(await scene.get('/series/XTB.money.M/observations'), 403);
    const { serves_values, first_period } = await (await scene.get('/series/XTB.money.M')).json();
    expect({ serves_values, first_period }).toEqual({ serves_values: false, first_period: null });
  });
});

describe('POST /scenarios', () => {
  const request = {
    frequency: 'annual',
    money: { start: '1990', values: Array.from({ length: 40 }, (_, i) => 100 + i + (i % 3)) },
    expectation: { rule: 'random_walk', window: { kind: 'expanding', length: 10 } },
    slope: { method: 'fixed', b: 0.5 },
  };

  it('answers the result of the computation', async () => {
    const response = await scene.post('/scenarios', JSON.stringify(request));
    expect(response.status).toBe(200);
    const result = (await response.json()) as { periods: string[]; slope: { lambda: number } };
    expect(result.periods.at(-1)).toBe('2029');
    expect(result.slope.lambda).toBeCloseTo(1 / 3, 12);
  });

  it('needs the scope', async () => {
    const { plain } = await scene.makeKey(['read'], 'editor');
    const init = { method: 'POST', body: '{}', headers: { 'content-type': 'application/json' } };
    await problemOf(await ask(scene.api, '/scenarios', plain, init), 403);
    await problemOf(await ask(scene.api, '/scenarios', null, init), 401);
  });

  it.each(['', '{', 'null x', '{"a":1,}', '\u{feff}{}x'])('refuses %j as no JSON', async (body) => {
    const problem = await problemOf(await scene.post('/scenarios', body), 400);
    expect(problem.errors?.[0]?.pointer).toBe('');
  });

  it.each(['null', '[]', '3', '"x"', '{}', '['.repeat(50_000) + ']'.repeat(50_000)])(
    'refuses %.20s as no request',
    async (body) => {
      await problemOf(await scene.post('/scenarios', body), 422);
    },
  );

  it('names every fault', async () => {
    const faulty = { ...request, colour: 1, money: { start: '1990', values: [1, -1, 1e999] } };
    const problem = await problemOf(
      await scene.post('/scenarios', JSON.stringify(faulty).replace('null', '1e999')),
      422,
    );
    const pointers = problem.errors?.map((error) => error.pointer);
    expect(pointers).toEqual(
      expect.arrayContaining(['/colour', '/money/values/1', '/money/values/2']),
    );
  });

  it('takes at most 2,000 periods and 1 MiB', async () => {
    const long = { ...request, money: { start: '1000', values: Array(2_001).fill(1) } };
    const problem = await problemOf(await scene.post('/scenarios', JSON.stringify(long)), 422);
    expect(problem.errors?.[0]?.pointer).toBe('/money/values');
    await problemOf(await scene.post('/scenarios', ' '.repeat(1024 * 1024 + 1)), 413);
  });

  it.each<Record<string, string>>([
    { 'content-type': 'text/plain' },
    { 'content-type': 'application/json; charset=latin1' },
    { 'content-encoding': 'gzip' },
  ])('refuses a body sent as %j', async (headers) => {
    await problemOf(await scene.post('/scenarios', '{}', headers), 415);
  });

  it('cannot be read', async () => {
    const response = await scene.get('/scenarios');
    expect(response.headers.get('allow')).toBe('POST, OPTIONS');
    await problemOf(response, 405);
  });
});

it('says nothing of what fails inside, and logs it', async () => {
  const api = (await import('../../api/app.ts')).createApi({
    ...scene.runtime,
    workers: { compute: () => Promise.reject(new Error('secret detail')) } as never,
  });
  const body = JSON.stringify({
    frequency: 'annual',
    money: { start: '1990', values: [1, 2, 3, 4, 5] },
    expectation: { rule: 'random_walk', window: { kind: 'expanding', length: 2 } },
    slope: { method: 'fixed', b: 0.5 },
  });
  const init = { method: 'POST', body, headers: { 'content-type': 'application/json' } };
  const problem = await problemOf(await ask(api, '/scenarios', scene.key, init), 500);
  expect(JSON.stringify(problem)).not.toContain('secret');
  expect(scene.logged).toHaveLength(1);
});

it('answers a preflight without a key and without cost', async () => {
  const response = await ask(scene.api, '/economies', null, { method: 'OPTIONS' });
  expect(response.status).toBe(204);
  expect(response.headers.get('access-control-allow-methods')).toBe('GET,HEAD,OPTIONS');
  expect(response.headers.get('ratelimit')).toBeNull();
});
