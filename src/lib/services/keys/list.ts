import type { ServiceContext } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { type Scope, scopesOf } from './scopes.ts';

/** A key as its owner sees it: enough to tell it apart, nothing to use it by. */
export interface KeySummary {
  id: string;
  name: string;
  /** Its first characters. */
  start: string;
  scopes: Scope[];
  plan: { name: string; perMinute: number; perMonth: number };
  createdAt: Date;
  lastUsedAt: Date | null;
  /** Calls of this month of UTC, as settled. */
  callsThisMonth: number;
}

/** The keys of the one who asks that still work, newest first. */
export async function listKeys(
  ctx: Pick<ServiceContext, 'db' | 'actor' | 'now'>,
): Promise<KeySummary[]> {
  const owner = requirePermission(ctx.actor, 'account.own');
  const now = ctx.now();
  const month = new Date(Date.UTC(now.getUTCFullYear(), now.getUTCMonth(), 1));
  const rows = await ctx.db
    .selectFrom('api_key')
    .innerJoin('plan', 'plan.name', 'api_key.plan')
    .leftJoin('key_usage', (join) =>
      join
        .onRef('key_usage.key_id', '=', 'api_key.id')
        .on('key_usage.span', '=', 'month')
        .on('key_usage.starts_at', '=', month),
    )
    .select([
      'api_key.id',
      'api_key.name',
      'api_key.start',
      'api_key.permissions',
      'api_key.created_at',
      'api_key.last_request',
      'plan.name as plan',
      'plan.per_minute',
      'plan.per_month',
      'key_usage.calls',
    ])
    .where('api_key.person_id', '=', owner.id)
    .where('api_key.enabled', '=', true)
    .orderBy('api_key.created_at', 'desc')
    .orderBy('api_key.id')
    .execute();
  return rows.map((row) => ({
    id: row.id,
    name: row.name ?? '',
    start: row.start ?? '',
    scopes: scopesOf(row.permissions),
    plan: { name: row.plan, perMinute: row.per_minute, perMonth: row.per_month },
    createdAt: row.created_at,
    lastUsedAt: row.last_request,
    callsThisMonth: row.calls ?? 0,
  }));
}
