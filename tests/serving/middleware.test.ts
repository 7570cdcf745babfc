import type { APIContext, MiddlewareNext } from 'astro';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Role } from '../../src/lib/services/context.ts';

const who = vi.hoisted(() => ({ role: null as string | null }));
vi.mock('astro:middleware', () => ({ defineMiddleware: (handler: unknown) => handler }));
vi.mock('../../src/lib/auth.ts', () => ({
  actorOf: () => Promise.resolve(who.role && { id: 'p', role: who.role, name: 'P' }),
}));
const { onRequest } = await import('../../src/middleware.ts');

const error = vi.fn();
const next = vi.fn<MiddlewareNext>();

function ask(path: string): Promise<Response> {
  const context = {
    url: new URL(path, 'http://127.0.0.1'),
    request: new Request(new URL(path, 'http://127.0.0.1')),
    locals: { runtime: { clock: { now: () => new Date(0) }, log: { error } }, requestId: 'r' },
    redirect: (to: string, status: number) =>
      new Response(null, { status, headers: { location: to } }),
  } as unknown as APIContext;
  return onRequest(context, next) as Promise<Response>;
}

beforeEach(() => {
  error.mockReset();
  next.mockReset().mockImplementation(() => Promise.resolve(new Response('page')));
});

describe('the desk', () => {
  it.each<[Role, string, string | undefined]>([
    ['subscriber', '/desk/data/', '/desk/refused/?kind=forbidden'],
    ['administrator', '/desk', '/desk/refused/?kind=forbidden'],
    ['editor', '/desk/data/', undefined],
    ['reviewer', '/desk/', undefined],
    ['subscriber', '/account/keys/', undefined],
    ['administrator', '/account/', undefined],
  ])('shows a %s at %s the page %s', async (role, path, shown) => {
    who.role = role;
    await ask(path);
    expect(next).toHaveBeenCalledExactlyOnceWith(shown);
  });

  it('asks who is not signed in to do so', async () => {
    who.role = null;
    const response = await ask('/desk/data/');
    expect(response.status).toBe(303);
    expect(next).not.toHaveBeenCalled();
  });
});

describe('a page that fails', () => {
  it('is logged before it is sent', async () => {
    const failure = new Error('broken');
    next.mockRejectedValue(failure);
    await expect(ask('/method/')).rejects.toBe(failure);
    expect(error).toHaveBeenCalledExactlyOnceWith({ err: failure, request: 'r' }, 'a page failed');
  });

  it('is logged while it is sent', async () => {
    const failure = new Error('broken');
    next.mockResolvedValue(
      new Response(new ReadableStream({ pull: (controller) => controller.error(failure) })),
    );
    const response = await ask('/method/');
    await expect(response.text()).rejects.toBe(failure);
    expect(error).toHaveBeenCalledExactlyOnceWith({ err: failure, request: 'r' }, 'a page failed');
  });

  it('leaves status, headers and bytes of others alone', async () => {
    next.mockResolvedValue(
      new Response('gone', { status: 404, headers: { 'content-type': 'text/html' } }),
    );
    const response = await ask('/method/');
    expect(response.status).toBe(404);
    expect(response.headers.get('content-type')).toBe('text/html; charset=utf-8');
    expect(await response.text()).toBe('gone');
    expect(error).not.toHaveBeenCalled();
  });
});
