import { getRequestListener } from '@hono/node-server';
import type { NodeApp } from 'astro/app/node';
import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { createApi } from '../../../api/app.ts';
import { badRequest } from '../../../api/problems.ts';
import { isMigrated } from '../../../db/migrate.ts';
import { isLoopback } from '../env.ts';
import { type PublishedPages, send } from '../publication/serve.ts';
import type { Runtime } from '../runtime.ts';
import { canonicalAddress, pathOf } from './address.ts';
import type { Asset } from './assets.ts';
import { render } from './render.ts';

/** Rendered when asked for: they depend on who asks. */
const ON_DEMAND = /^\/(desk|account|admin|sign-in|sign-up|sign-out)(\/|$)/;

/** Far more than any form of prose needs. */
const LARGEST_BODY = 256 * 1024;
/** Takes data files, and refuses a large one in its own words by the length its sender gives, without reading it. */
const TAKES_FILES = /^\/desk\/data\/?$/;
const FORM = /^(application\/x-www-form-urlencoded|multipart\/form-data)\s*(;|$)/i;

export interface HandlerParts {
  app: NodeApp;
  runtime: Runtime;
  pages: PublishedPages;
  assets: Map<string, Asset>;
}

type Handler = (request: IncomingMessage, response: ServerResponse) => Promise<void>;

/** Answers every request of a process: stored pages and files first, then the API, then pages on demand. */
export function createHandler({ app, runtime, pages, assets }: HandlerParts): Handler {
  const api = createApi(runtime);
  const answerApi = getRequestListener(api.fetch);
  const answerOnDemand = getRequestListener(async (request, bindings) => {
    const { incoming, outgoing } = bindings as {
      incoming: IncomingMessage;
      outgoing: ServerResponse;
    };
    return render(app, runtime, asAddressed(runtime, request, incoming), {
      clientAddress: incoming.socket.remoteAddress ?? '',
      requestId: String(outgoing.getHeader('x-request-id')),
    });
  });

  return async (request, response) => {
    response.setHeader('x-request-id', randomUUID());
    const target = request.url ?? '/';
    const path = pathOf(target);
    if (path === null) return unreadable(response, target);
    if (path === '/healthz') return plain(response, 200, 'alive\n');
    if (path === '/readyz') return readiness(runtime, pages, response);
    if (!isOurHost(runtime, request.headers.host)) {
      return plain(response, 421, 'This address is not served here.\n');
    }
    const isRead = request.method === 'GET' || request.method === 'HEAD';

    // The page's own address answers 404 as any other that is not there.
    const stored = path === '/404/' ? null : pages.answer(path);
    if (stored) {
      if (isRead) return send(pages, stored, request, response);
      response.setHeader('allow', 'GET, HEAD');
      return plain(response, 405, 'This address can only be read.\n');
    }
    if (path.startsWith('/api/v')) {
      await answerApi(request, response);
      return;
    }
    if (ON_DEMAND.test(path)) {
      const refused = isRead ? null : refusedBody(path, request);
      if (refused) {
        // Without a length there is no saying how long the rest would take.
        if (refused.status === 411) response.setHeader('connection', 'close');
        return plain(response, refused.status, refused.text);
      }
      await answerOnDemand(request, response);
      return;
    }
    const asset = assets.get(path);
    if (asset && isRead) return sendAsset(asset, request, response);

    const canonical = canonicalAddress(path);
    if (isRead && canonical !== path && pages.answer(canonical)) {
      response.setHeader('location', encodeURI(canonical));
      return plain(response, 308, `Moved to ${canonical}\n`);
    }
    const missing = pages.answer('/404/');
    if (missing) return send(pages, missing, request, response);
    return plain(response, 404, 'There is nothing at this address.\n');
  };
}

/**
 * The request under the address the reader sees: behind TLS that is not the one which reached this process, and
 * Astro compares it with a form's origin. The demo is reached directly, by whichever name of this machine.
 */
function asAddressed(runtime: Runtime, request: Request, incoming: IncomingMessage): Request {
  if (runtime.env.mode !== 'production') return request;
  const { method, headers, body, signal } = request;
  const init = { method, headers, body, signal, duplex: 'half' };
  return new Request(new URL(runtime.env.publicUrl + incoming.url!), init);
}

/** Why the body of a request to a page on demand is not read, judged by its headers alone; null where it may be. */
function refusedBody(
  path: string,
  { method, headers }: IncomingMessage,
): { status: number; text: string } | null {
  if (headers['content-length'] === undefined) {
    return { status: 411, text: 'The request must say how long it is (Content-Length).\n' };
  }
  const length = Number(headers['content-length']);
  if (length > LARGEST_BODY && !TAKES_FILES.test(path)) {
    return { status: 413, text: 'A form may hold at most 256 KiB.\n' };
  }
  const type = headers['content-type'] ?? '';
  const isNothing = length === 0 && type === '';
  if (method === 'POST' && !isNothing && !FORM.test(type)) {
    return { status: 415, text: 'Only forms can be sent to this address.\n' };
  }
  return null;
}

/** In the demo only this machine; in production the public address and this machine. */
function isOurHost(runtime: Runtime, header: string | undefined): boolean {
  if (!header) return false;
  const host = header.replace(/:\d+$/, '');
  if (isLoopback(host)) return true;
  return (
    runtime.env.mode === 'production' &&
    host.toLowerCase() === new URL(runtime.env.publicUrl).hostname
  );
}

async function readiness(
  runtime: Runtime,
  pages: PublishedPages,
  response: ServerResponse,
): Promise<void> {
  const migrated = await isMigrated(runtime.db).catch(() => null);
  const states = {
    database: migrated === null ? 'away' : 'reachable',
    migrations: migrated ? 'current' : 'not known to be current',
    pages: pages.hasPages ? 'ready' : 'not ready',
  };
  const isReady = migrated === true && pages.hasPages;
  response.setHeader('content-type', 'application/json');
  response.setHeader('cache-control', 'no-store');
  response.writeHead(isReady ? 200 : 503).end(`${JSON.stringify(states)}\n`);
}

function sendAsset(asset: Asset, request: IncomingMessage, response: ServerResponse): void {
  response.setHeader('content-type', asset.mediaType);
  response.setHeader('cache-control', asset.cacheControl);
  response.setHeader('x-content-type-options', 'nosniff');
  response.setHeader('etag', asset.etag);
  if (request.headers['if-none-match'] === asset.etag) {
    response.writeHead(304).end();
    return;
  }
  response.setHeader('content-length', asset.bytes.byteLength);
  response.writeHead(200).end(request.method === 'HEAD' ? undefined : asset.bytes);
}

/** The API answers in problem documents always, also where it is not asked. */
function unreadable(response: ServerResponse, target: string): void {
  const message = 'The address cannot be read.';
  if (!target.startsWith('/api/v')) return plain(response, 400, `${message}\n`);
  const { status, type, title, detail, errors } = badRequest([{ message }]).parts;
  const instance = `urn:uuid:${String(response.getHeader('x-request-id'))}`;
  response.setHeader('content-type', 'application/problem+json');
  response.setHeader('cache-control', 'no-store');
  response.setHeader('x-content-type-options', 'nosniff');
  response.setHeader('access-control-allow-origin', '*');
  response
    .writeHead(status)
    .end(`${JSON.stringify({ type, title, status, detail, instance, errors })}\n`);
}

function plain(response: ServerResponse, status: number, text: string): void {
  response.setHeader('content-type', 'text/plain; charset=utf-8');
  response.setHeader('cache-control', 'no-store');
  response.setHeader('x-content-type-options', 'nosniff');
  response.writeHead(status).end(text);
}
