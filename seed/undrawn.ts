import type { ServiceContext } from '../src/lib/services/context.ts';

/** The build that pages are put in force under while nobody draws them; no real one has a word for its name. */
const UNDRAWN = 'undrawn';

/**
 * The context with a stand-in for every page. Of the pages that months of publications put in force nine in ten
 * are replaced before the time of seeding, and drawing is what takes longest: so none is drawn at its time, and
 * `redraw` finds those that are left in force or coming as the work of another build.
 */
export function withoutDrawing(ctx: ServiceContext): ServiceContext {
  return {
    ...ctx,
    build: UNDRAWN,
    workers: {
      ...ctx.workers,
      // It names its instant, since a page equal to the one in force would not be put in force.
      page: async (address, { at }) => ({
        status: address === '/404/' ? 404 : 200,
        headers: { 'content-type': 'application/octet-stream' },
        body: new TextEncoder().encode(`Not drawn for ${at.toISOString()}`),
      }),
    },
  };
}
