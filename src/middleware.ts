import { defineMiddleware } from 'astro:middleware';
import { actorOf } from './lib/auth.ts';

/** Pages for people who are signed in; everything else is the same for every reader. */
const PERSONAL = /^\/(desk|account|admin)(\/|$)/;
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
  return guarded(await next(), ASKS_WHO.test(url.pathname));
});

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
