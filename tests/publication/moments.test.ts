import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { sql } from 'kysely';
import {
  bringUpToDate,
  isBehind,
  lateReleases,
  redraw,
  takeOut,
} from '../../src/lib/publication/moments.ts';
import type { View } from '../../src/lib/services/view.ts';
import { PublishedPages } from '../../src/lib/publication/serve.ts';
import { scene } from './scene.ts';

type Scene = Awaited<ReturnType<typeof scene>>;
let stage: Scene;

beforeEach(async () => {
  stage = await scene();
});

/** What a process that starts now would answer, and one that was there before. */
async function process() {
  const pages = new PublishedPages(stage.ctx.db, { now: stage.ctx.now }, stage.ctx.store);
  await pages.sync();
  return {
    pages,
    async text(address: string): Promise<string | null> {
      const answer = pages.answer(address);
      if (!answer) return null;
      const bytes = await pages.bytes(answer.row.artefact_hash, 'identity');
      return new TextDecoder().decode(bytes!);
    },
  };
}

function at(time: string): void {
  stage.clock.at = new Date(time);
}

const announce = (period: string) =>
  stage.ctx.db
    .insertInto('announcement')
    .values({
      economy_code: 'XTA',
      period,
      announced_at: stage.ctx.now(),
      due_at: new Date('2031-12-01T08:00:00Z'),
      announced_by: 'reviewer',
    })
    .execute();

describe('a coming moment', () => {
  it('shows nothing before its second and everything from it, in every process, with no work in between', async () => {
    const early = await process();
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    await bringUpToDate(stage.ctx);
    await early.pages.sync();
    const late = await process();

    at('2031-10-01T07:59:59.999Z');
    for (const one of [early, late]) {
      expect(await one.text('/releases/XTA/2031-08/')).toBeNull();
      expect(await one.text('/')).toBe('/: ');
    }
    at('2031-10-01T08:00:00.000Z');
    for (const one of [early, late]) {
      expect(await one.text('/releases/XTA/2031-08/')).toBe('/releases/XTA/2031-08/: 2031-08');
      expect(await one.text('/')).toBe('/: 2031-08');
    }
  });

  it('is drawn on top of the one before it', async () => {
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    await bringUpToDate(stage.ctx);
    await stage.schedule('2031-07', '2031-10-01T07:30:00Z');
    await bringUpToDate(stage.ctx);
    const one = await process();
    at('2031-10-01T07:30:00Z');
    expect(await one.text('/')).toBe('/: 2031-07');
    at('2031-10-01T08:00:00Z');
    expect(await one.text('/')).toBe('/: 2031-07 2031-08');
  });

  it('loses a release that is taken out, and the later ones are drawn without it', async () => {
    await stage.schedule('2031-07', '2031-10-01T07:30:00Z');
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    await bringUpToDate(stage.ctx);
    const one = await process();
    await stage.ctx.db.transaction().execute(async (db) => {
      await db
        .updateTable('release')
        .set({ state: 'approved', scheduled_for: null })
        .where('period', '=', '2031-07')
        .execute();
      await takeOut({ ...stage.ctx, db }, new Date('2031-10-01T07:30:00Z'));
    });
    await one.pages.sync();
    at('2031-10-01T08:00:00Z');
    // Between the two, the later moment does not count: it was drawn with what is gone.
    expect(await one.text('/')).toBe('/: ');
    at('2031-10-01T07:10:00Z');
    expect(await isBehind(stage.ctx.db, stage.ctx.now())).toBe(true);
    await bringUpToDate(stage.ctx);
    await one.pages.sync();
    at('2031-10-01T08:00:00Z');
    expect(await one.text('/')).toBe('/: 2031-08');
    expect(await one.text('/releases/XTA/2031-07/')).toBeNull();
  });

  it('changes nothing where a page cannot be drawn, and is found again', async () => {
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    const broken = {
      ...stage.ctx,
      workers: { ...stage.ctx.workers, page: () => Promise.reject(new Error('no page')) },
    };
    await expect(bringUpToDate(broken)).rejects.toThrow('no page');
    expect(await isBehind(stage.ctx.db, stage.ctx.now())).toBe(true);
    const rows = await stage.ctx.db.selectFrom('published').selectAll().execute();
    expect(rows).toEqual([]);
    await bringUpToDate(stage.ctx);
    expect(await isBehind(stage.ctx.db, stage.ctx.now())).toBe(false);
  });

  it('never counts from a second that passed while it was drawn', async () => {
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    const slow = {
      ...stage.ctx,
      workers: {
        ...stage.ctx.workers,
        page: (address: string, view: { at: Date }) => {
          at('2031-10-01T08:00:01Z');
          return stage.ctx.workers.page(address, view);
        },
      },
    };
    await bringUpToDate(slow);
    at('2031-10-01T09:00:00Z');
    const one = await process();
    expect(await one.text('/releases/XTA/2031-08/')).toBeNull();

    // Nor with what comes after it.
    await stage.schedule('2031-09', '2031-10-01T10:00:00Z');
    await bringUpToDate(stage.ctx);
    await one.pages.sync();
    at('2031-10-01T10:00:00Z');
    expect(await one.text('/')).toBe('/: 2031-09');
  });
});

describe('trouble while drawing', () => {
  const whileDrawing = (deed: (address: string) => Promise<void> | void) => {
    const { page } = stage.ctx.workers;
    return {
      ...stage.ctx,
      workers: {
        ...stage.ctx.workers,
        page: async (address: string, view: View) => {
          await deed(address);
          return page(address, view);
        },
      },
    };
  };

  it('draws a later moment without the one whose second passed meanwhile', async () => {
    await stage.schedule('2031-07', '2031-10-01T07:30:00Z');
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    let drawn = 0;
    await bringUpToDate(
      whileDrawing(() => {
        if (++drawn === 15) at('2031-10-01T07:30:01Z');
      }),
    );
    const one = await process();
    at('2031-10-01T08:00:00Z');
    expect(await one.text('/')).toBe('/: 2031-08');
    expect(await one.text('/releases/XTA/2031-07/')).toBeNull();
    expect(await lateReleases(stage.ctx.db, stage.ctx.now())).toEqual(['XTA-2031-07-r1']);
  });

  it('puts earlier moments in force where a later one cannot be drawn', async () => {
    await stage.schedule('2031-07', '2031-10-01T07:30:00Z');
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    const broken = whileDrawing((address) => {
      if (address.startsWith('/releases/XTA/2031-08')) throw new Error('no page');
    });
    await expect(bringUpToDate(broken)).rejects.toThrow('no page');
    const one = await process();
    at('2031-10-01T07:30:00Z');
    expect(await one.text('/')).toBe('/: 2031-07');
  });

  it('survives the loss of the connection that holds the lock', async () => {
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    let ended = false;
    const cut = whileDrawing(async () => {
      if (ended) return;
      ended = true;
      await sql`
        select pg_terminate_backend(pid) from pg_locks
        where locktype = 'advisory' and granted and pid <> pg_backend_pid()
          and database = (select oid from pg_database where datname = current_database())
      `.execute(stage.ctx.db);
    });
    await bringUpToDate(cut).catch(() => {});
    await bringUpToDate(stage.ctx);
    const one = await process();
    at('2031-10-01T08:00:00Z');
    expect(await one.text('/')).toBe('/: 2031-08');
  });

  it('finds a date that was announced while pages were drawn', async () => {
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    let announced = false;
    const busy = whileDrawing(async () => {
      if (announced) return;
      announced = true;
      at('2031-10-01T07:00:01Z');
      await announce('2031-11');
    });
    await announce('2031-08');
    await bringUpToDate(busy);
    at('2031-10-01T07:00:10Z');
    expect(await isBehind(stage.ctx.db, stage.ctx.now())).toBe(true);
    await bringUpToDate(stage.ctx);
    at('2031-10-01T07:00:20Z');
    expect(await isBehind(stage.ctx.db, stage.ctx.now())).toBe(false);
  });
});

describe('an announced date', () => {
  const rowsOf = async (address: string) =>
    stage.ctx.db.selectFrom('published').where('address', '=', address).selectAll().execute();

  it('brings the economy its page three seconds after it is drawn, once', async () => {
    await announce('2031-11');
    expect(await isBehind(stage.ctx.db, stage.ctx.now())).toBe(true);
    await bringUpToDate(stage.ctx);
    const one = await process();
    expect(await one.text('/economies/XTA/')).toBeNull();
    // Whoever looks again before it is in force has nothing to do.
    at('2031-10-01T07:00:01Z');
    expect(await isBehind(stage.ctx.db, stage.ctx.now())).toBe(false);
    at('2031-10-01T07:00:03Z');
    expect(await one.text('/economies/XTA/')).toBe('/economies/XTA/: ');
    await bringUpToDate(stage.ctx);
    expect(await rowsOf('/economies/XTA/')).toHaveLength(1);
  });

  it('is in the newest explainer too, and in that of the month before a release', async () => {
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    await stage.schedule('2031-09', '2031-10-01T09:00:00Z');
    await bringUpToDate(stage.ctx);
    const seconds = (await rowsOf('/releases/XTA/2031-08/')).map((row) =>
      row.visible_from.toISOString().slice(11, 16),
    );
    expect(seconds).toEqual(['08:00', '09:00']);
  });
});

describe('a vintage', () => {
  it('is public from the second of the first release that freezes it, and not if that is taken out', async () => {
    const publicFrom = async () =>
      (await stage.ctx.db.selectFrom('vintage').select('public_from').executeTakeFirstOrThrow())
        .public_from;
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    expect(await publicFrom()).toBeNull();
    await bringUpToDate(stage.ctx);
    expect(await publicFrom()).toEqual(new Date('2031-10-01T08:00:00Z'));
    await stage.ctx.db.transaction().execute(async (db) => {
      await db.updateTable('release').set({ state: 'approved', scheduled_for: null }).execute();
      await takeOut({ ...stage.ctx, db }, new Date('2031-10-01T08:00:00Z'));
    });
    expect(await publicFrom()).toBeNull();
  });
});

describe('another build', () => {
  it('draws the pages in force and to come again, each at its own second', async () => {
    await stage.schedule('2031-08', '2031-10-01T08:00:00Z');
    await bringUpToDate(stage.ctx);
    at('2031-10-01T07:01:00Z');
    const before = await process();
    expect(await redraw(stage.ctx)).toBe(0);
    const next = { ...stage.ctx, build: 'two' };
    expect(await redraw(next)).toBeGreaterThan(5);
    await before.pages.sync();
    expect(await before.text('/')).toBe('/: ');
    at('2031-10-01T08:00:00Z');
    expect(await before.text('/')).toBe('/: 2031-08');
  });
});

afterEach(async () => {
  await stage.end();
});
