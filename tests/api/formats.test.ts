import Papa from 'papaparse';
import { brotliDecompressSync, gunzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openScene, type Scene, SECOND_SECOND } from './scene.ts';

let scene: Scene;
beforeAll(async () => {
  scene = await openScene();
});
afterAll(() => scene.desk.close());

const IDS = ['XTA.money_surprise.M', 'XTA.money_surprise_cumulated.M', 'XTA.money.M'];
const address = (id: string) => `/series/${id}/observations`;

describe.each(IDS)('%s as CSV', (id) => {
  it('has the same rows as JSON', async () => {
    const json = (await (await scene.get(address(id))).json()) as {
      data: Record<string, unknown>[];
    };
    const response = await scene.get(address(id), { accept: 'text/csv' });
    expect(response.headers.get('content-type')).toBe('text/csv; charset=utf-8');
    const { data, meta } = Papa.parse<Record<string, string>>(await response.text(), {
      header: true,
      skipEmptyLines: true,
    });
    expect(meta.fields).toEqual(['series', 'period', 'value', 'status', 'release', 'published_at']);
    const read = data.map((row) => ({ ...row, value: row.value ? Number(row.value) : null }));
    expect(read).toEqual(json.data);
  });
});

it('keeps the digits of the file in CSV', async () => {
  const csv = await (await scene.get(`${address('XTA.money.M')}?format=csv`)).text();
  expect(csv).toContain('XTA.money.M,2030-11,160.10,normal,XTA-2030-12-r1,');
  expect(csv.endsWith('\r\n')).toBe(true);
});

describe('the format', () => {
  it.each([
    ['text/csv;q=0.5, application/json', 'application/json'],
    ['application/json;q=0.5, text/*', 'text/csv; charset=utf-8'],
    ['*/*', 'application/json'],
    ['text/html, */*;q=0.1', 'application/json'],
    ['application/json;q=0, */*', 'text/csv; charset=utf-8'],
    ['', 'application/json'],
  ])('for Accept: %s is %s', async (accept, type) => {
    const response = await scene.get(address(IDS[0]!), { accept });
    expect(response.headers.get('content-type')).toBe(type);
  });

  it('asked for in the address wins', async () => {
    const path = `${address(IDS[0]!)}?format=csv`;
    const response = await scene.get(path, { accept: 'application/json' });
    expect(response.headers.get('content-type')).toContain('text/csv');
  });
});

describe('a copy', () => {
  it.each([
    ['gzip', gunzipSync],
    ['br', brotliDecompressSync],
  ] as const)('in %s is the same and has a tag of its own', async (encoding, decode) => {
    const plain = await scene.get(address(IDS[0]!));
    const packed = await scene.get(address(IDS[0]!), { 'accept-encoding': encoding });
    expect(packed.headers.get('content-encoding')).toBe(encoding);
    expect(packed.headers.get('vary')).toContain('Accept-Encoding');
    expect(packed.headers.get('etag')).not.toBe(plain.headers.get('etag'));
    const bytes = Buffer.from(await packed.arrayBuffer());
    expect(packed.headers.get('content-length')).toBe(String(bytes.byteLength));
    expect(decode(bytes).toString()).toBe(await plain.text());
  });

  it('is not sent again to who has it, and that costs nothing', async () => {
    const first = await scene.get(address(IDS[0]!), { 'accept-encoding': 'br' });
    const etag = first.headers.get('etag')!;
    const left = (response: Response) => response.headers.get('ratelimit')?.split(';')[1];
    for (const tag of [etag, `W/${etag}`, `"other", ${etag}`, '*']) {
      const again = await scene.get(address(IDS[0]!), { 'if-none-match': tag });
      expect(again.status).toBe(304);
      expect(await again.text()).toBe('');
      expect(again.headers.get('etag')).not.toBeNull();
      expect(again.headers.get('content-type')).toBeNull();
      expect(left(again)).toBe(left(first));
    }
    const other = await scene.get(address(IDS[0]!), { 'if-none-match': '"other"' });
    expect(other.status).toBe(200);
  });

  it('knows when it last changed', async () => {
    const path = address(IDS[0]!);
    const changed = new Date(SECOND_SECOND).toUTCString();
    const first = await scene.get(path);
    expect(first.headers.get('last-modified')).toBe(changed);
    const status = async (since: string) =>
      (await scene.get(path, { 'if-modified-since': since })).status;
    expect(await status(changed)).toBe(304);
    expect(await status(new Date(Date.parse(SECOND_SECOND) - 1_000).toUTCString())).toBe(200);
    expect(await status('yesterday')).toBe(200);
    const both = { 'if-modified-since': changed, 'if-none-match': '"other"' };
    expect((await scene.get(path, both)).status).toBe(200);
  });
});
