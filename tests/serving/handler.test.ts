import type { NodeApp } from 'astro/app/node';
import { createServer, request as ask, type IncomingHttpHeaders, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { PublishedPages } from '../../src/lib/publication/serve.ts';
import type { Runtime } from '../../src/lib/runtime.ts';
import { createHandler } from '../../src/lib/serving/handler.ts';

const STORED = new Set(['/', '/api/', '/method/', '/releases/XAL/2026-10/r1/']);
const FORM = { 'content-type': 'application/x-www-form-urlencoded' };

interface Got {
  status: number;
  headers: IncomingHttpHeaders;
  text: string;
}

interface Sent {
  method?: string;
  headers?: Record<string, string>;
  body?: string;
}

/** A handler whose pages on demand tell the request they were given. */
function served(mode: 'demo' | 'production') {
  const app = {
    match: () => undefined,
    render: async (request: Request) =>
      Response.json({ url: request.url, method: request.method, body: await request.text() }),
  } as unknown as NodeApp;
  const pages = {
    answer: (path: string) => (STORED.has(path) ? {} : null),
  } as unknown as PublishedPages;
  const runtime = {
    env: { mode, publicUrl: 'https://figures.example' },
    db: {},
    clock: { now: () => new Date(0) },
  } as unknown as Runtime;
  const handle = createHandler({ app, runtime, pages, assets: new Map() });
  let server: Server;
  return {
    async start() {
      server = createServer((request, response) => void handle(request, response));
      await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    },
    stop: () => {
      server.closeAllConnections();
      server.close();
    },
    get origin() {
      return `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
    },
    get(path: string, { method = 'GET', headers = {}, body = '' }: Sent = {}): Promise<Got> {
      const { port } = server.address() as AddressInfo;
      return new Promise((resolve, reject) => {
        const asked = ask({ host: '127.0.0.1', port, path, method, headers }, (response) => {
          let text = '';
          response.setEncoding('utf8').on('data', (part: string) => (text += part));
          response.on('end', () =>
            resolve({ status: response.statusCode!, headers: response.headers, text }),
          );
        });
        asked.on('error', reject).end(body);
      });
    },
  };
}

const demo = served('demo');
const production = served('production');

beforeAll(async () => {
  await Promise.all([demo.start(), production.start()]);
});

afterAll(() => {
  demo.stop();
  production.stop();
});

describe('a page on demand', () => {
  const sent = { method: 'POST', headers: { ...FORM, 'content-length': '3' }, body: 'a=1' };

  it('has the public address in production, where TLS ends before this process', async () => {
    const { text } = await production.get('/account/keys/?a=%2F', sent);
    expect(JSON.parse(text)).toEqual({
      url: 'https://figures.example/account/keys/?a=%2F',
      method: 'POST',
      body: 'a=1',
    });
    const read = await production.get('/desk/');
    expect(JSON.parse(read.text)).toMatchObject({
      url: 'https://figures.example/desk/',
      method: 'GET',
    });
  });

  it('has the address it was asked under in the demo', async () => {
    const { text } = await demo.get('/account/', sent);
    expect(JSON.parse(text)).toMatchObject({ url: `${demo.origin}/account/`, body: 'a=1' });
  });

  it.each([
    ['without a length', '/desk/', { ...FORM, 'transfer-encoding': 'chunked' }, 411],
    ['without a length, to the data desk', '/desk/data/', { 'transfer-encoding': 'chunked' }, 411],
    ['that is too long', '/desk/', { ...FORM, 'content-length': '262145' }, 413],
    ['of JSON', '/desk/', { 'content-type': 'application/json', 'content-length': '2' }, 415],
    ['of plain text', '/desk/', { 'content-type': 'text/plain', 'content-length': '2' }, 415],
    ['of no type', '/desk/', { 'content-length': '2' }, 415],
  ])('takes no body %s', async (_, path, headers, status) => {
    const length = Number((headers as Record<string, string>)['content-length'] ?? 2);
    const body = 'x'.repeat(length);
    const got = await demo.get(path, { method: 'POST', headers, body });
    expect(got.status).toBe(status);
    expect(got.headers['content-type']).toBe('text/plain; charset=utf-8');
  });

  it('takes the longest form, a button without fields, and a file at the data desk', async () => {
    const long = { ...FORM, 'content-length': '262144' };
    const body = 'x'.repeat(262_144);
    expect((await demo.get('/desk/', { method: 'POST', headers: long, body })).status).toBe(200);
    const none = { 'content-length': '0' };
    expect((await demo.get('/sign-out/', { method: 'POST', headers: none })).status).toBe(200);
    const file = {
      'content-type': 'multipart/form-data; boundary=b',
      'content-length': String(7 * 1024 * 1024),
    };
    const bytes = 'x'.repeat(7 * 1024 * 1024);
    const got = await demo.get('/desk/data/', { method: 'POST', headers: file, body: bytes });
    expect(got.status).toBe(200);
  });
});

describe('an address', () => {
  it.each(['/desk/../method/', '/%2e%2e/', '//desk/', '/desk/%00/', '/%E2%28'])(
    '%s is refused in plain words',
    async (path) => {
      const got = await demo.get(path);
      expect(got.status).toBe(400);
      expect(got.headers['content-type']).toBe('text/plain; charset=utf-8');
    },
  );

  it.each(['/api/v1/%E2%28', '/api/v1/economies/%00', '/api/v1/../../desk/'])(
    '%s is refused as the API refuses',
    async (path) => {
      const got = await demo.get(path);
      expect(got.status).toBe(400);
      expect(got.headers['content-type']).toBe('application/problem+json');
      expect(JSON.parse(got.text)).toMatchObject({
        type: 'urn:slackwater:problem:bad-request',
        status: 400,
        instance: `urn:uuid:${String(got.headers['x-request-id'])}`,
      });
    },
  );

  it.each([
    ['/api', '/api/'],
    ['/Method/', '/method/'],
    ['/releases/xal/2026-10/R1', '/releases/XAL/2026-10/r1/'],
  ])('%s leads to %s', async (path, location) => {
    const got = await demo.get(path);
    expect(got.status).toBe(308);
    expect(got.headers.location).toBe(location);
  });
});
