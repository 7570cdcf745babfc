import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { periodsFrom } from '../../src/lib/econ/periods.ts';
import { folderStore } from '../../src/lib/publication/store.ts';
import type { Actor, Role, ServiceContext } from '../../src/lib/services/context.ts';
import { type NewEconomy, createEconomy } from '../../src/lib/services/economies/create.ts';
import { createPerson } from '../../src/lib/services/people/create.ts';
import { approveRelease } from '../../src/lib/services/releases/approve.ts';
import { computeRelease } from '../../src/lib/services/releases/compute.ts';
import { draftRelease } from '../../src/lib/services/releases/draft.ts';
import { scheduleRelease } from '../../src/lib/services/releases/schedule.ts';
import { submitRelease } from '../../src/lib/services/releases/submit.ts';
import { writeRelease } from '../../src/lib/services/releases/write.ts';
import { approveSpecification } from '../../src/lib/services/specifications/approve.ts';
import { draftSpecification } from '../../src/lib/services/specifications/draft.ts';
import { acceptVintage } from '../../src/lib/services/vintages/accept.ts';
import { testDatabase } from '../setup/database.ts';
import { plainWorkers } from '../setup/workers.ts';

export type Desk = Awaited<ReturnType<typeof openDesk>>;

/** Those who work at the test's desk; two editors, so that one can come after another. */
type Name = Role | 'otherEditor';

/** A desk with people of every role, a clock that the test moves, and verbs done by whoever may. */
export async function openDesk() {
  const { db, url, drop } = await testDatabase();
  const folder = await mkdtemp(join(tmpdir(), 'slackwater-desk-'));
  const clock = { at: new Date('2031-10-01T07:00:00Z') };
  const context = (actor: Actor): ServiceContext => ({
    db,
    now: () => new Date(clock.at),
    actor,
    store: folderStore(folder),
    workers: plainWorkers(),
    publicUrl: 'http://127.0.0.1:1',
    build: 'test',
  });
  const product = context({ id: null, role: 'system', name: 'Slackwater' });
  const actors = {} as Record<Name, Actor & { id: string }>;
  const roles: Record<Name, Role> = {
    subscriber: 'subscriber',
    editor: 'editor',
    otherEditor: 'editor',
    reviewer: 'reviewer',
    administrator: 'administrator',
  };
  for (const [name, role] of Object.entries(roles) as [Name, Role][]) {
    const email = `${name.toLowerCase()}@example.org`;
    const id = await createPerson(product, { name, email, role, password: PASSWORD });
    actors[name] = { id, role, name };
  }
  const as = (name: Name) => context(actors[name]);

  return {
    db,
    url,
    clock,
    product,
    actors,
    as,
    context,
    economy: (code: string, change: Partial<NewEconomy> = {}) =>
      createEconomy(as('editor'), { ...anEconomy, code, ...change }),
    vintage: (economy: string, bytes = csv()) =>
      acceptVintage(as('editor'), {
        economy,
        fileName: 'data.csv',
        bytes,
        sourcePublishedAt: new Date('2031-09-25T09:00:00Z'),
      }).then(({ id }) => id),
    async specification(economy: string) {
      const { id } = await draftSpecification(as('editor'), {
        economy,
        reason: 'Fixed for a test.',
        holdsFrom: '2020-01',
        assumptions: ASSUMPTIONS,
      });
      await approveSpecification(as('reviewer'), id);
      return id;
    },
    /** A draft of the last month of the data, from a new economy on. */
    async draft(economy: string) {
      await this.economy(economy);
      const vintageId = await this.vintage(economy);
      const specificationId = await this.specification(economy);
      return draftRelease(as('editor'), { economy, period: LAST, vintageId, specificationId });
    },
    async submitted(economy: string) {
      const id = await this.draft(economy);
      await computeRelease(as('editor'), id);
      const version = await this.versionOf(id);
      await writeRelease(as('editor'), {
        id,
        version,
        headline: 'Money grew',
        explainer: 'Words.',
      });
      await submitRelease(as('editor'), id);
      return id;
    },
    async approved(economy: string) {
      const id = await this.submitted(economy);
      await approveRelease(as('reviewer'), { id, version: await this.versionOf(id) });
      return id;
    },
    async scheduled(economy: string, at: Date) {
      const id = await this.approved(economy);
      await scheduleRelease(as('reviewer'), { id, at });
      return id;
    },
    async release(id: string) {
      return db.selectFrom('release').selectAll().where('id', '=', id).executeTakeFirstOrThrow();
    },
    async versionOf(id: string) {
      return (await this.release(id)).version;
    },
    /** Actions in the audit trail about a subject, oldest first. */
    async trail(subject: string) {
      const rows = await db
        .selectFrom('audit')
        .select('action')
        .where('subject', '=', subject)
        .orderBy('id')
        .execute();
      return rows.map((row) => row.action);
    },
    async close() {
      await drop();
      await rm(folder, { recursive: true });
    },
  };
}

export const PASSWORD = 'a password of some length';

const ASSUMPTIONS = {
  expectation: { rule: 'random_walk', window: { kind: 'expanding', length: 24 } },
  slope: { method: 'fixed', b: 0.5 },
};

/** First and last month of `csv()`. */
const FIRST = '2026-01';
export const LAST = '2030-12';

/** Sixty months of money that grows unevenly, and prices. */
export function csv(): Uint8Array {
  const rows = periodsFrom(FIRST, 60, 'monthly').map((period, i) => {
    const money = 100 + i + ((i * 7) % 5) / 10;
    return `${period},${money.toFixed(2)},${(90 + i / 2).toFixed(1)}`;
  });
  return text(['period,money,prices', ...rows].join('\n'));
}

/** The bytes of a text in UTF-8. */
export function text(content: string): Uint8Array {
  return new TextEncoder().encode(content);
}

const series = {
  unit: 'index, 2030 = 100',
  timing: 'average',
  adjustment: 'unadjusted',
  source: 'Invented for a test',
  licence: 'CC BY 4.0',
  serveValues: true,
} as const;

const anEconomy: Omit<NewEconomy, 'code'> = {
  name: 'Testmark',
  nameInText: 'Testmark',
  currency: 'test crown',
  frequency: 'monthly',
  contact: 'desk@example.org',
  series: {
    money: { title: 'Broad money', ...series },
    prices: { title: 'Consumer prices', ...series },
  },
};
