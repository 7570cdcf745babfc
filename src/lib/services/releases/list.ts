import type { ServiceContext } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { type State, stateAt } from './state.ts';

/** A release as the desk's list shows it: where it stands, and nothing of what it says. */
export interface DeskRelease {
  id: string;
  economyCode: string;
  economyName: string;
  period: string;
  revision: number;
  state: State;
  createdAt: Date;
  createdBy: string;
  submittedAt: Date | null;
  approvedAt: Date | null;
  scheduledFor: Date | null;
  /** Scheduled, and its pages are drawn. */
  isReady: boolean;
  /** Its second has passed and its pages were not ready: it needs a newly announced time. */
  isLate: boolean;
  returnedReason: string | null;
}

/** Every release, the newest reference period first. */
export async function listDeskReleases(ctx: ServiceContext): Promise<DeskRelease[]> {
  requirePermission(ctx.actor, 'drafts.see');
  const now = ctx.now();
  const rows = await ctx.db
    .selectFrom('release as r')
    .innerJoin('economy as e', 'e.code', 'r.economy_code')
    .innerJoin('person as p', 'p.id', 'r.created_by')
    .select([
      'r.id',
      'r.economy_code as economyCode',
      'e.name as economyName',
      'r.period',
      'r.revision',
      'r.state as stored',
      'r.created_at as createdAt',
      'p.name as createdBy',
      'r.submitted_at as submittedAt',
      'r.approved_at as approvedAt',
      'r.scheduled_for as scheduledFor',
      'r.ready_for',
      'r.returned_reason as returnedReason',
    ])
    .orderBy('r.period', 'desc')
    .orderBy('e.name')
    .orderBy('r.revision', 'desc')
    .execute();
  return rows.map(({ stored, ready_for, ...row }) => {
    const state = stateAt({ state: stored, ready_for }, now);
    const isPast = row.scheduledFor !== null && row.scheduledFor <= now;
    return {
      ...row,
      state,
      isReady: ready_for !== null,
      isLate: state === 'scheduled' && isPast,
    };
  });
}
