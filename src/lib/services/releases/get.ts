import type { Economy, Release, Vintage } from '../../../../db/tables.ts';
import type { Assumptions, ComputeRequest, ComputeResult } from '../../econ/types.ts';
import { type InTransaction, type ServiceContext, ServiceError } from '../context.ts';
import { type SignedIn, requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { whyNotSecondPair } from './contributors.ts';
import { type State, stateAt } from './state.ts';
import { missingFor } from './submit.ts';
import { recordViewIn } from './view.ts';

/** What happened to a release, as the audit trail has it; looks at it are left out. */
export interface HistoryEntry {
  at: Date;
  action: string;
  person: string;
  detail: Record<string, unknown>;
}

/** A release with all the desk works on. */
export interface DeskReleaseDetail {
  release: Omit<Release, 'request' | 'result'>;
  state: State;
  request: ComputeRequest | null;
  result: ComputeResult | null;
  economy: Economy;
  vintage: Vintage;
  specification: {
    id: string;
    version: number;
    assumptions: Assumptions;
    reason: string;
    approvedAt: Date | null;
  };
  people: {
    createdBy: string;
    submittedBy: string | null;
    approvedBy: string | null;
    scheduledBy: string | null;
  };
  /** The time announced last for this economy and period, if any. */
  announcedFor: Date | null;
  /** What is missing before it can be submitted; empty when nothing is. */
  missing: { field: string; message: string }[];
  /** Why the person looking may not decide on it; null where nothing of it is theirs. */
  notSecondPair: string | null;
  history: HistoryEntry[];
}

/** One release for the desk. The look is recorded where it is not public yet. */
export async function getDeskRelease(ctx: ServiceContext, id: string): Promise<DeskReleaseDetail> {
  const actor = requirePermission(ctx.actor, 'drafts.see');
  return transact(ctx, async (trx) => {
    const detail = await read(trx, actor, id);
    await recordViewIn(trx, { id, place: 'desk' });
    return detail;
  });
}

async function read(ctx: InTransaction, actor: SignedIn, id: string): Promise<DeskReleaseDetail> {
  const { db } = ctx;
  const row = await db.selectFrom('release').selectAll().where('id', '=', id).executeTakeFirst();
  if (!row) throw new ServiceError('not_found', `There is no release ${id}.`);
  const { request, result, ...release } = row;
  const economy = await db
    .selectFrom('economy')
    .selectAll()
    .where('code', '=', release.economy_code)
    .executeTakeFirstOrThrow();
  const vintage = await db
    .selectFrom('vintage')
    .selectAll()
    .where('id', '=', release.vintage_id)
    .executeTakeFirstOrThrow();
  const specification = await db
    .selectFrom('specification')
    .selectAll()
    .where('id', '=', release.specification_id)
    .executeTakeFirstOrThrow();
  const announced = await db
    .selectFrom('announcement')
    .select('due_at')
    .where('economy_code', '=', release.economy_code)
    .where('period', '=', release.period)
    .orderBy('announced_at', 'desc')
    .limit(1)
    .executeTakeFirst();
  const names = await namesOf(ctx, release);
  return {
    release,
    state: stateAt(release, ctx.now()),
    request: request as ComputeRequest | null,
    result: result as ComputeResult | null,
    economy,
    vintage,
    specification: {
      id: specification.id,
      version: specification.version,
      assumptions: specification.assumptions as Assumptions,
      reason: specification.reason,
      approvedAt: specification.approved_at,
    },
    people: names,
    announcedFor: announced?.due_at ?? null,
    missing: missingFor(row, specification.approved_at !== null),
    notSecondPair: await whyNotSecondPair(ctx, id, actor.id),
    history: await historyOf(ctx, id),
  };
}

async function namesOf(
  ctx: InTransaction,
  release: Omit<Release, 'request' | 'result'>,
): Promise<DeskReleaseDetail['people']> {
  const { created_by, submitted_by, approved_by, scheduled_by } = release;
  const ids = [created_by, submitted_by, approved_by, scheduled_by].filter((id) => id !== null);
  const people = await ctx.db
    .selectFrom('person')
    .select(['id', 'name'])
    .where('id', 'in', ids)
    .execute();
  const name = (id: string | null) => people.find((person) => person.id === id)?.name ?? null;
  return {
    createdBy: name(created_by) ?? '',
    submittedBy: name(submitted_by),
    approvedBy: name(approved_by),
    scheduledBy: name(scheduled_by),
  };
}

async function historyOf(ctx: InTransaction, id: string): Promise<HistoryEntry[]> {
  const rows = await ctx.db
    .selectFrom('audit as a')
    .leftJoin('person as p', 'p.id', 'a.person_id')
    .select(['a.at', 'a.action', 'a.detail', 'p.name'])
    .where('a.subject', '=', `release ${id}`)
    .where('a.action', '<>', 'release.viewed')
    .orderBy('a.id', 'desc')
    .execute();
  return rows.map((row) => ({
    at: row.at,
    action: row.action,
    person: row.name ?? 'Slackwater',
    detail: row.detail as Record<string, unknown>,
  }));
}
