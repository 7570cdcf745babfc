import { getRequestListener } from '@hono/node-server';
import type { NodeApp } from 'astro/app/node';
import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { createApi } from '../../../api/app.ts';
import { isMigrated } from '../../../db/migrate.ts';
import { isLoopback } from '../env.ts';
import { type PublishedPages, send } from '../publication/serve.ts';
import type { Runtime } from '../runtime.ts';
import { canonicalAddress, pathOf } from './address.ts';
import type { Asset } from './assets.ts';
import { render } from './render.ts';

/** Rendered when asked for: they depend on who asks. */
const ON_DEMAND = /^\/(desk|account|admin|sign-in|sign-up|sign-out)(\/|$)/;

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
    return render(app, runtime, request, {
      clientAddress: incoming.socket.remoteAddress ?? '',
      requestId: String(outgoing.getHeader('x-request-id')),
    });
  });

  return async (request, response) => {
    response.setHeader('x-request-id', randomUUID());
    const path = pathOf(request.url ?? '/');
    if (path === '/healthz') return plain(response, 200, 'alive\n');
    if (path === '/readyz') return readiness(runtime, pages, response);
    if (!isOurHost(runtime, request.headers.host)) {
      return plain(response, 421, 'This address is not served here.\n');
    }
    if (path === null) return plain(response, 400, 'The address cannot be read.\n');
    const isRead = request.method === 'GET' || request.method === 'HEAD';

    // The page's own address answers 404 as any other that is not there.
    const stored = path === '/404/' ? null : pages.answer(path);
    if (stored) {
      if (isRead) return send(pages, stored, request, response);
      response.setHeader('allow', 'GET, HEAD');
      return plain(response, 405, 'This address can only be read.\n');
    }
    if (path.startsWith('/api/v') || path === '/api') {
      await answerApi(request, response);
      return;
    }
    if (ON_DEMAND.test(path)) {
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

function plain(response: ServerResponse, status: number, text: string): void {
  response.setHeader('content-type', 'text/plain; charset=utf-8');
  response.setHeader('cache-control', 'no-store');
  response.setHeader('x-content-type-options', 'nosniff');
  response.writeHead(status).end(text);
}
