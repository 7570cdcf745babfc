import { createServer, request as ask, type IncomingHttpHeaders, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { brotliDecompressSync, gunzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { bringUpToDate } from '../../src/lib/publication/moments.ts';
import { PublishedPages, send } from '../../src/lib/publication/serve.ts';
import { canonicalAddress, pathOf } from '../../src/lib/serving/address.ts';
import { scene } from './scene.ts';

let stage: Awaited<ReturnType<typeof scene>>;
let server: Server;

beforeAll(async () => {
  stage = await scene();
  await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
  await bringUpToDate(stage.ctx);
  const pages = new PublishedPages(stage.ctx.db, { now: stage.ctx.now }, stage.ctx.store);
  await pages.sync();
  server = createServer((request, response) => {
    const answer = pages.answer(pathOf(request.url!)!);
    if (answer) void send(pages, answer, request, response);
    else response.writeHead(404).end();
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
});

afterAll(async () => {
  server.closeAllConnections();
  server.close();
  await stage.end();
});

interface Got {
  status: number;
  headers: IncomingHttpHeaders;
  body: Buffer;
}

function get(path: string, headers: Record<string, string> = {}, method = 'GET'): Promise<Got> {
  const { port } = server.address() as AddressInfo;
  return new Promise((resolve, reject) => {
    const asked = ask({ host: '127.0.0.1', port, path, method, headers }, (response) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('end', () =>
        resolve({
          status: response.statusCode!,
          headers: response.headers,
          body: Buffer.concat(parts),
        }),
      );
    });
    asked.on('error', reject).end();
  });
}

const PAGE = '/releases/XTA/2031-08/';
const TEXT = `${PAGE}: 2031-08`;

describe('a stored page', () => {
  beforeAll(() => {
    stage.clock.at = new Date('2031-10-01T08:00:00Z');
  });

  it('is the same bytes in every encoding that the reader takes', async () => {
    const plain = await get(PAGE);
    const br = await get(PAGE, { 'accept-encoding': 'gzip, deflate, br' });
    const gzip = await get(PAGE, { 'accept-encoding': 'gzip, deflate' });
    const refused = await get(PAGE, { 'accept-encoding': 'br;q=0, gzip;q=0' });
    expect(plain.body.toString()).toBe(TEXT);
    expect(br.headers['content-encoding']).toBe('br');
    expect(brotliDecompressSync(br.body).toString()).toBe(TEXT);
    expect(gzip.headers['content-encoding']).toBe('gzip');
    expect(gunzipSync(gzip.body).toString()).toBe(TEXT);
    expect(refused.headers['content-encoding']).toBeUndefined();
    const tags = [plain, br, gzip].map((answer) => answer.headers.etag);
    expect(new Set(tags).size).toBe(3);
    expect(plain.headers.vary).toBe('accept-encoding');
  });

  it('ignores the query, answers HEAD without a body, and 304 to who has it', async () => {
    const plain = await get(`${PAGE}?utm=1`);
    expect(plain.status).toBe(200);
    const head = await get(PAGE, {}, 'HEAD');
    expect(head.headers['content-length']).toBe(String(TEXT.length));
    expect(head.body.length).toBe(0);
    const known = await get(PAGE, { 'if-none-match': `"other", W/${plain.headers.etag!}` });
    expect(known.status).toBe(304);
    expect(known.body.length).toBe(0);
    const since = await get(PAGE, { 'if-modified-since': plain.headers['last-modified']! });
    expect(since.status).toBe(304);
    const older = await get(PAGE, { 'if-modified-since': 'Wed, 01 Oct 2031 07:59:59 GMT' });
    expect(older.status).toBe(200);
  });

  it('is kept by caches for 30 s at most, and never beyond the next announced time', async () => {
    expect((await get(PAGE)).headers['cache-control']).toBe('public, max-age=30');
    await stage.ctx.db
      .insertInto('announcement')
      .values({
        economy_code: 'XTA',
        period: '2031-09',
        announced_at: stage.clock.at,
        due_at: new Date('2031-10-01T08:00:12.500Z'),
        announced_by: 'reviewer',
      })
      .execute();
    const pages = new PublishedPages(stage.ctx.db, { now: stage.ctx.now }, stage.ctx.store);
    await pages.sync();
    expect(pages.answer(PAGE)!.maxAge).toBe(12);
  });
});

describe('the memory of a process', () => {
  it('reads the disk once for many who ask at once, and remembers what is not there', async () => {
    let reads = 0;
    const store = {
      ...stage.ctx.store,
      get: (...asked: Parameters<typeof stage.ctx.store.get>) => {
        reads++;
        return stage.ctx.store.get(...asked);
      },
    };
    const pages = new PublishedPages(stage.ctx.db, { now: stage.ctx.now }, store);
    await pages.sync();
    const { artefact_hash } = pages.answer(PAGE)!.row;
    reads = 0;
    await Promise.all(Array.from({ length: 50 }, () => pages.bytes(artefact_hash, 'br')));
    expect(reads).toBe(1);
    const unknown = 'f'.repeat(64);
    expect(await pages.bytes(unknown, 'br')).toBeNull();
    expect(await pages.bytes(unknown, 'br')).toBeNull();
    expect(reads).toBe(2);
  });
});

describe('addresses', () => {
  it.each([
    ['/releases/xal/2031-04', '/releases/XAL/2031-04/'],
    ['/Releases/XAL/2031-04/', '/releases/XAL/2031-04/'],
    ['/economies', '/economies/'],
    ['/images/xal/latest/surprise-wide.png', '/images/XAL/latest/surprise-wide.png'],
    ['/data/xal.Money_Surprise.m.csv', '/data/XAL.money_surprise.M.csv'],
    ['/', '/'],
    ['/method/', '/method/'],
    ['/Method', '/method/'],
    ['/api', '/api/'],
    ['/releases/XAL/2026-10/R1', '/releases/XAL/2026-10/r1/'],
    ['/releases/xal/2000-q4/r1/', '/releases/XAL/2000-Q4/r1/'],
    ['/images/xal/2000-q4/Surprise-Wide.png', '/images/XAL/2000-Q4/surprise-wide.png'],
    ['/data/releases/XAL-2026-10-r1/figures.csv', '/data/releases/XAL-2026-10-r1/figures.csv'],
    ['/Data/Releases/XAL-2000-Q4-r1/Request.json', '/data/releases/XAL-2000-Q4-r1/request.json'],
  ])('%s has the one form %s', (given, canonical) => {
    expect(canonicalAddress(given)).toBe(canonical);
  });

  it('are read without query and fragment; what cannot be decoded has none', () => {
    expect(pathOf('/method/?a=1#b')).toBe('/method/');
    expect(pathOf('/%E2%82%AC')).toBe('/€');
    expect(pathOf('/%E2%28')).toBeNull();
  });

  it.each([
    '/desk/../method/',
    '/./method/',
    '/method/..',
    '/%2e%2E/method/',
    '/%252e%252e/method/',
    '//method/',
    '/method//',
    '/desk%2Fdata',
    '/desk\\data',
    '/desk%5Cdata',
    '/desk/releases/%00/',
    '/desk/releases/%2500/',
    'http://elsewhere.example/',
    '*',
    '',
  ])('%j is no address: its parts could be read in two ways', (target) => {
    expect(pathOf(target)).toBeNull();
  });

  it('may hold dots within a name, and anything in the query', () => {
    expect(pathOf('/data/XAL.money_surprise.M.csv?next=/a/../b%00')).toBe(
      '/data/XAL.money_surprise.M.csv',
    );
    expect(pathOf('/.well-known/x..y')).toBe('/.well-known/x..y');
  });
});
