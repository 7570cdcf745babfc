import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Db } from '../../db/connection.ts';
import { folderStore } from '../../src/lib/publication/store.ts';
import type { Workers } from '../../src/lib/publication/workers.ts';
import type { ServiceContext } from '../../src/lib/services/context.ts';
import { listReleases } from '../../src/lib/services/releases/public.ts';
import { testDatabase } from '../setup/database.ts';
import { plainWorkers } from '../setup/workers.ts';

/** One economy with a vintage and a specification, and a clock that the test moves. */
export async function scene() {
  const { db, url, drop } = await testDatabase();
  const folder = await mkdtemp(join(tmpdir(), 'slackwater-publication-'));
  await furnish(db);
  const clock = { at: new Date('2031-10-01T07:00:00Z') };
  const ctx: ServiceContext = {
    db,
    now: () => new Date(clock.at),
    actor: { id: null, role: 'system', name: 'test' },
    store: folderStore(folder),
    workers: listingWorkers(db),
    publicUrl: 'http://127.0.0.1:1',
    build: 'one',
  };
  return {
    ctx,
    clock,
    url,
    /** Puts a release into the state that the schedule verb leaves. */
    async schedule(period: string, at: string) {
      await db
        .insertInto('release')
        .values({
          id: `XTA-${period}-r1`,
          economy_code: 'XTA',
          period,
          revision: 1,
          state: 'scheduled',
          headline: period,
          vintage_id: '1',
          specification_id: '1',
          created_at: clock.at,
          created_by: 'editor',
          approved_by: 'reviewer',
          scheduled_for: new Date(at),
        })
        .onConflict((conflict) =>
          conflict.column('id').doUpdateSet({ state: 'scheduled', scheduled_for: new Date(at) }),
        )
        .execute();
    },
    async end() {
      await drop();
      await rm(folder, { recursive: true });
    },
  };
}

/** Pages that list the releases of their view, so that a test can read off a page what it was drawn with. */
function listingWorkers(db: Db): Workers {
  return plainWorkers({
    async page(address, view) {
      const releases = await listReleases(db, view);
      const periods = releases.map((release) => release.period).sort();
      return {
        status: address === '/404/' ? 404 : 200,
        headers: { 'content-type': 'text/html; charset=utf-8' },
        body: new TextEncoder().encode(`${address}: ${periods.join(' ')}`),
      };
    },
  });
}

async function furnish(db: Db): Promise<void> {
  const created_at = new Date('2031-01-01T00:00:00Z');
  await db
    .insertInto('person')
    .values(
      (['editor', 'reviewer'] as const).map((role) => ({
        id: role,
        name: role,
        email: `${role}@example.org`,
        email_verified: true,
        updated_at: created_at,
        role,
      })),
    )
    .execute();
  await db
    .insertInto('economy')
    .values({
      code: 'XTA',
      name: 'Testmark',
      name_in_text: 'Testmark',
      currency: 'test crown',
      frequency: 'monthly',
      contact: 'desk@example.org',
      created_at,
      created_by: 'editor',
    })
    .execute();
  await db
    .insertInto('vintage')
    .values({
      economy_code: 'XTA',
      file_name: 'xta.csv',
      file_hash: '0'.repeat(64),
      file_size: 1,
      source_published_at: created_at,
      known_from: created_at,
      loaded_by: 'editor',
    })
    .execute();
  await db
    .insertInto('specification')
    .values({
      economy_code: 'XTA',
      version: 1,
      assumptions: '{}',
      reason: 'test',
      holds_from: '2031-01',
      created_at,
      created_by: 'editor',
      approved_at: created_at,
      approved_by: 'reviewer',
    })
    .execute();
}
