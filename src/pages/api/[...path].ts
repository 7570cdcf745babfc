import type { APIRoute } from 'astro';
import type { Api } from '../../../api/context.ts';
import { createApi } from '../../../api/app.ts';

/** One API a process, as in the product's own server, which stands in front of this address and needs it only in development. */
let api: Api | undefined;

export const ALL: APIRoute = ({ request, locals }) => {
  api ??= createApi(locals.runtime);
  return api.fetch(request);
};
