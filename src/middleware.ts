import { defineMiddleware } from 'astro:middleware';
import { actorOf } from './lib/auth.ts';
import { may } from './lib/services/people/permissions.ts';

/** Pages for people who are signed in; everything else is the same for every reader. */
const PERSONAL = /^\/(desk|account|admin)(\/|$)/;
const DESK = /^\/desk(\/|$)/;
const ASKS_WHO = /^\/(desk|account|admin|sign-in|sign-up|sign-out)(\/|$)/;

const POLICY = [
  "default-src 'self'",
  "script-src 'self'",
  "style-src 'self'",
  "img-src 'self' data:",
  "font-src 'self'",
  "connect-src 'self'",
  "object-src 'none'",
  "base-uri 'none'",
  "form-action 'self'",
  "frame-ancestors 'none'",
].join('; ');

/** Says who asks and what instant is shown, keeps the desk to its people, and gives every page its headers. */
export const onRequest = defineMiddleware(async (context, next) => {
  const { locals, request, url } = context;
  locals.view ??= { at: locals.runtime.clock.now() };
  locals.actor = ASKS_WHO.test(url.pathname)
    ? await actorOf(locals.runtime.auth, request.headers)
    : null;
  if (PERSONAL.test(url.pathname) && !locals.actor) {
    const back = encodeURIComponent(url.pathname + url.search);
    return context.redirect(`/sign-in/?next=${back}`, 303);
  }
  const tell = (error: unknown) =>
    locals.runtime.log.error({ err: error, request: locals.requestId }, 'a page failed');
  // Decided here, before a page reads a form: what was read cannot be shown as another page.
  const mayEnter = !DESK.test(url.pathname) || may(locals.actor!, 'drafts.see');
  try {
    const response = await next(mayEnter ? undefined : '/desk/refused/?kind=forbidden');
    return watched(guarded(response, ASKS_WHO.test(url.pathname)), tell);
  } catch (error) {
    tell(error);
    throw error;
  }
});

/** The same answer, telling of what fails while it is sent: pages are printed while they are read. */
function watched(response: Response, tell: (error: unknown) => void): Response {
  if (!response.body) return response;
  const reader = response.body.getReader();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      try {
        const { done, value } = await reader.read();
        if (done) controller.close();
        else controller.enqueue(value);
      } catch (error) {
        tell(error);
        throw error;
      }
    },
    cancel: (reason) => reader.cancel(reason),
  });
  const { status, statusText, headers } = response;
  return new Response(body, { status, statusText, headers });
}

/** The headers every page has; what depends on who asks is never kept. */
function guarded(response: Response, isPersonal: boolean): Response {
  const { headers } = response;
  if (headers.get('content-type') === 'text/html') {
    headers.set('content-type', 'text/html; charset=utf-8');
  }
  headers.set('content-security-policy', POLICY);
  headers.set('x-content-type-options', 'nosniff');
  headers.set('referrer-policy', 'strict-origin-when-cross-origin');
  headers.set('permissions-policy', 'camera=(), geolocation=(), microphone=()');
  if (isPersonal) headers.set('cache-control', 'no-store');
  return response;
}
