import type { NodeApp } from 'astro/app/node';
import { randomUUID } from 'node:crypto';
import type { RenderedPage } from '../publication/workers.ts';
import type { Runtime } from '../runtime.ts';
import type { View } from '../services/view.ts';

/** What a stored page keeps of the headers it was drawn with. */
const KEPT_HEADERS = [
  'content-type',
  'content-security-policy',
  'x-content-type-options',
  'referrer-policy',
  'permissions-policy',
  'link',
];

/** A page of the site as a reader would get it at the view's instant. */
export async function renderPage(
  app: NodeApp,
  runtime: Runtime,
  address: string,
  view: View,
): Promise<RenderedPage> {
  const request = new Request(new URL(address, runtime.env.publicUrl));
  const response = await render(app, runtime, request, { view });
  const headers: Record<string, string> = {};
  for (const name of KEPT_HEADERS) {
    const value = response.headers.get(name);
    if (value !== null) headers[name] = value;
  }
  return {
    status: response.status,
    headers,
    body: new Uint8Array(await response.arrayBuffer()),
  };
}

/** Answers a request with the built site; without a view the page shows now (src/middleware.ts). */
export async function render(
  app: NodeApp,
  runtime: Runtime,
  request: Request,
  options: { view?: View; clientAddress?: string; requestId?: string } = {},
): Promise<Response> {
  // The middleware adds who is signed in, and the instant where none is given.
  const locals = {
    runtime,
    requestId: options.requestId ?? randomUUID(),
    ...(options.view ? { view: options.view } : {}),
  } as App.Locals;
  return app.render(request, {
    routeData: app.match(request),
    clientAddress: options.clientAddress ?? '',
    locals,
    addCookieHeader: true,
  });
}
