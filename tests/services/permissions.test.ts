import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Role, ServiceContext } from '../../src/lib/services/context.ts';
import { createEconomy } from '../../src/lib/services/economies/create.ts';
import { listDeskEconomies } from '../../src/lib/services/economies/list.ts';
import { createPerson } from '../../src/lib/services/people/create.ts';
import { getProfile } from '../../src/lib/services/people/profile.ts';
import { renameSelf } from '../../src/lib/services/people/rename.ts';
import { setRole } from '../../src/lib/services/people/setRole.ts';
import { approveRelease } from '../../src/lib/services/releases/approve.ts';
import { chooseInputs } from '../../src/lib/services/releases/chooseInputs.ts';
import { computeRelease } from '../../src/lib/services/releases/compute.ts';
import { draftRelease } from '../../src/lib/services/releases/draft.ts';
import { getDeskRelease } from '../../src/lib/services/releases/get.ts';
import { listDeskReleases } from '../../src/lib/services/releases/list.ts';
import { scheduleRelease } from '../../src/lib/services/releases/schedule.ts';
import { sendBackRelease } from '../../src/lib/services/releases/sendBack.ts';
import { submitRelease } from '../../src/lib/services/releases/submit.ts';
import { unscheduleRelease } from '../../src/lib/services/releases/unschedule.ts';
import { recordView } from '../../src/lib/services/releases/view.ts';
import { writeRelease } from '../../src/lib/services/releases/write.ts';
import { approveSpecification } from '../../src/lib/services/specifications/approve.ts';
import { draftSpecification } from '../../src/lib/services/specifications/draft.ts';
import { listSpecifications } from '../../src/lib/services/specifications/list.ts';
import { acceptVintage } from '../../src/lib/services/vintages/accept.ts';
import { getVintage } from '../../src/lib/services/vintages/get.ts';
import { listVintages } from '../../src/lib/services/vintages/list.ts';
import { type Desk, openDesk, text } from './desk.ts';

/** The table "Who may what" of the product, row by row; it is written here, not taken from the code. */
const table = {
  'own profile': ['subscriber', 'editor', 'reviewer', 'administrator'],
  'economies and series metadata, vintages, specification drafts, release drafts, submit': [
    'editor',
  ],
  'see drafts and coming releases': ['editor', 'reviewer'],
  'approve, send back, schedule, unschedule; approve a specification': ['reviewer'],
  'people, roles': ['administrator'],
} as const satisfies Record<string, Role[]>;

type Row = keyof typeof table;
type Verb = (ctx: ServiceContext) => Promise<unknown>;

const id = 'XXX-2031-01-r1';
const inputs = { vintageId: '1', specificationId: '1' };

/** Every verb under the row of the table it belongs to, called with something that does not exist. */
const verbs: Record<Row, Record<string, Verb>> = {
  'own profile': {
    getProfile,
    renameSelf: (ctx) => renameSelf(ctx, { name: ' ' }),
  },
  'economies and series metadata, vintages, specification drafts, release drafts, submit': {
    createEconomy: (ctx) => createEconomy(ctx, {} as never),
    acceptVintage: (ctx) =>
      acceptVintage(ctx, {
        economy: 'XXX',
        fileName: 'x.csv',
        bytes: text('x'),
        sourcePublishedAt: new Date(0),
      }),
    draftSpecification: (ctx) =>
      draftSpecification(ctx, { economy: 'XXX', reason: 'x', holdsFrom: 'x', assumptions: {} }),
    draftRelease: (ctx) => draftRelease(ctx, { economy: 'XXX', period: '2031-01', ...inputs }),
    chooseInputs: (ctx) => chooseInputs(ctx, { id, version: 1, ...inputs }),
    computeRelease: (ctx) => computeRelease(ctx, id),
    writeRelease: (ctx) => writeRelease(ctx, { id, version: 1, headline: '', explainer: '' }),
    submitRelease: (ctx) => submitRelease(ctx, id),
  },
  'see drafts and coming releases': {
    listDeskEconomies,
    listVintages: (ctx) => listVintages(ctx),
    getVintage: (ctx) => getVintage(ctx, '0'),
    listSpecifications: (ctx) => listSpecifications(ctx),
    listDeskReleases,
    getDeskRelease: (ctx) => getDeskRelease(ctx, id),
    recordView: (ctx) => recordView(ctx, { id, place: 'preview' }),
  },
  'approve, send back, schedule, unschedule; approve a specification': {
    approveSpecification: (ctx) => approveSpecification(ctx, '0'),
    approveRelease: (ctx) => approveRelease(ctx, { id, version: 1 }),
    sendBackRelease: (ctx) => sendBackRelease(ctx, { id, reason: 'x' }),
    scheduleRelease: (ctx) => scheduleRelease(ctx, { id, at: new Date(0) }),
    unscheduleRelease: (ctx) => unscheduleRelease(ctx, { id, reason: 'x' }),
  },
  'people, roles': {
    createPerson: (ctx) => createPerson(ctx, {} as never),
    setRole: (ctx) => setRole(ctx, { personId: 'nobody', role: 'editor' }),
  },
};

let desk: Desk;
beforeAll(async () => {
  desk = await openDesk();
});
afterAll(() => desk.close());

describe.each(Object.keys(table) as Row[])('%s', (row) => {
  const roles = ['subscriber', 'editor', 'reviewer', 'administrator'] as const;
  const cases = Object.keys(verbs[row]).flatMap((verb) => roles.map((role) => ({ verb, role })));
  test.each(cases)('$verb, $role', async ({ verb, role }) => {
    const isAllowed = (table[row] as readonly Role[]).includes(role);
    const before = await auditRows();
    const kind = await outcome(verbs[row][verb]!(desk.as(role)));
    if (isAllowed) expect(kind).not.toBe('forbidden');
    else expect(kind).toBe('forbidden');
    // Nothing that is refused leaves a trace of having been done.
    expect(await auditRows()).toBe(before);
  });

  test('nobody signed in, and the product itself, may only create people', async () => {
    for (const [verb, call] of Object.entries(verbs[row])) {
      const kind = await outcome(call(desk.product));
      if (verb === 'createPerson') expect(kind).toBe('invalid');
      else expect([verb, kind]).toEqual([verb, 'forbidden']);
    }
  });
});

/** The kind of refusal; `done` where there was none. */
async function outcome(call: Promise<unknown>): Promise<string> {
  try {
    await call;
    return 'done';
  } catch (error) {
    return (error as { kind?: string }).kind ?? String(error);
  }
}

async function auditRows(): Promise<string> {
  const { count } = await desk.db
    .selectFrom('audit')
    .select((eb) => eb.fn.countAll<string>().as('count'))
    .executeTakeFirstOrThrow();
  return count;
}
