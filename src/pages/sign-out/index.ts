import type { APIRoute } from 'astro';
import { ask } from '../../lib/auth.ts';

export const POST: APIRoute = async ({ locals, request, clientAddress }) => {
  const client = { address: clientAddress, headers: request.headers };
  const { cookies } = await ask(locals.runtime.auth, client, '/sign-out', {});
  const response = new Response(null, {
    status: 303,
    headers: { location: '/sign-in/?done=out' },
  });
  for (const cookie of cookies) response.headers.append('set-cookie', cookie);
  return response;
};

/** An address typed by hand: signing out takes the button. */
export const GET: APIRoute = ({ redirect }) => redirect('/sign-in/', 303);
